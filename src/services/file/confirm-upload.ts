import type { Actor } from '@/domain/access/permission';
import { absent, type Failure, failure } from '@/domain/failure';
import { type FilePurpose, MOST_BYTES, tooLargeWords } from '@/domain/paperwork/file/limits';
import { fail, ok, type Result } from '@/domain/result';
import type { KeptFile } from '@/entities/paperwork/file';
import { performAct } from '../act/perform-act';
import { answered, type KeepDeps, type KeptAnswer, keepFile } from './keep-file';
import { findOwnFile } from './own-file';

/** Refuses without reading what is larger than any file may be. */
const refuseUnread = (
  deps: KeepDeps,
  actor: Actor,
  act: string,
  file: KeptFile,
  refusedBecause: string,
): Promise<Result<KeptAnswer, Failure>> => {
  const { seriesId, id: fileId } = file;
  return performAct(
    deps,
    actor,
    { id: act, kind: 'refuse-file', seriesId, input: { fileId } },
    async ({ em }) => {
      const found = await findOwnFile(em, actor, fileId, true);
      if (found === undefined) return fail(absent());
      Object.assign(found.file, { state: 'refused', refusedBecause });
      return ok<KeptAnswer>({ fileId, state: 'refused', refusedBecause });
    },
  );
};

/**
 * After the bytes were sent: the server reads them back from the store and decides by them alone. Sent
 * again, it gives the same answer; before anything arrived it says so, and may be asked again.
 */
export const confirmUpload = async (
  deps: KeepDeps,
  actor: Actor,
  input: { readonly act: string; readonly fileId: string },
): Promise<Result<KeptAnswer, Failure>> => {
  const found = await findOwnFile(deps.db, actor, input.fileId);
  if (found === undefined) return fail(absent());
  const { file } = found;
  const before = answered(file);
  if (before !== undefined) return ok(before);
  const purpose = file.purpose as FilePurpose;
  const head = await deps.objects.findHead(file.uploadKey);
  if (head === undefined) {
    const detail = `Nothing of ${file.name} has arrived yet. Send it again.`;
    return fail(failure('not-in-this-state', detail));
  }
  const most = MOST_BYTES[purpose];
  const kept =
    head.bytes > most
      ? await refuseUnread(deps, actor, input.act, file, tooLargeWords(purpose, head.bytes))
      : await keepFile(deps, actor, {
          act: input.act,
          fileId: file.id,
          paperworkId: found.paperwork.id,
          purpose,
          item: file.item,
          name: file.name,
          declaredType: file.declaredType,
          declaredBytes: file.declaredBytes,
          bytes: await deps.objects.read(file.uploadKey, most),
        });
  // The original stands under its hash by now; what was sent is scratch.
  if (kept.ok) await deps.objects.remove(file.uploadKey);
  return kept;
};
