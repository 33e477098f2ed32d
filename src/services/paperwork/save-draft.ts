import type { Actor } from '@/domain/access/permission';
import { absent, type Failure, failure, stale } from '@/domain/failure';
import type { PaperworkDraft } from '@/domain/paperwork/draft';
import { isWritable, STATE_WORDS } from '@/domain/paperwork/state';
import { fail, ok, type Result } from '@/domain/result';
import { type ActDeps, performAct } from '../act/perform-act';
import { findOwnPaperwork, isId } from './own-paperwork';

/**
 * Keeps the draft as it is typed. `version` is the one the actor last saw: a newer draft, from another
 * device, is not overwritten but answered with `stale`.
 */
export const saveDraft = async (
  deps: ActDeps,
  actor: Actor,
  input: {
    readonly act: string;
    readonly paperworkId: string;
    readonly version: number;
    readonly draft: PaperworkDraft;
  },
): Promise<Result<{ readonly version: number; readonly savedAt: string }, Failure>> => {
  const { act, paperworkId, version, draft } = input;
  if (!isId(paperworkId)) return fail(absent());
  const known = await findOwnPaperwork(deps.db, actor, paperworkId);
  if (known === undefined) return fail(absent());
  const { seriesId } = known;
  return performAct(
    deps,
    actor,
    { id: act, kind: 'save-draft', seriesId, input: { paperworkId, version, draft } },
    async ({ em, at }) => {
      const paperwork = await findOwnPaperwork(em, actor, paperworkId, true);
      if (paperwork === undefined) return fail(absent());
      if (!isWritable(paperwork.state)) {
        const detail = `This paperwork is ${STATE_WORDS[paperwork.state].toLowerCase()} and no longer written in.`;
        return fail(failure('not-in-this-state', detail));
      }
      if (paperwork.version !== version) return fail(stale());
      paperwork.draft = draft as unknown as Record<string, unknown>;
      paperwork.updatedAt = at;
      paperwork.updatedBy = actor.personId;
      await em.flush();
      return ok({ version: paperwork.version, savedAt: at.toISOString() });
    },
  );
};
