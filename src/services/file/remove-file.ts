import type { Actor } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { isWritable } from '@/domain/paperwork/state';
import { fail, ok, type Result } from '@/domain/result';
import { type ActDeps, performAct } from '../act/perform-act';
import { wrongPlace } from './find-unwelcome';
import { findOwnFile } from './own-file';

/** Takes a file out of the draft. Versions that were handed in before keep it. */
export const removeFile = async (
  deps: ActDeps,
  actor: Actor,
  { act, fileId }: { readonly act: string; readonly fileId: string },
): Promise<Result<{ readonly fileId: string }, Failure>> => {
  const known = await findOwnFile(deps.db, actor, fileId);
  if (known === undefined) return fail(absent());
  const { seriesId } = known.file;
  return performAct(
    deps,
    actor,
    { id: act, kind: 'remove-file', seriesId, input: { fileId } },
    async ({ em, at }) => {
      const found = await findOwnFile(em, actor, fileId, true);
      if (found === undefined) return fail(absent());
      if (!isWritable(found.paperwork.state)) return fail(wrongPlace());
      found.file.removedAt = at;
      return ok({ fileId });
    },
  );
};
