import { rightsOn } from '@/domain/access/paperwork-access';
import type { Actor } from '@/domain/access/permission';
import { absent, type Failure, type Fault, failure, invalid, stale } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { canonicalJson } from '@/domain/ledger/canonical';
import type { PaperworkDraft } from '@/domain/paperwork/draft';
import { isWritable, STATE_WORDS } from '@/domain/paperwork/state';
import { fail, ok, type Result } from '@/domain/result';
import { toDocument } from '@/domain/rulebook/document';
import type { Paperwork } from '@/entities/paperwork/paperwork';
import { type ActDeps, performAct } from '../act/perform-act';
import { findOwnPaperwork } from './own-paperwork';

const same = (a: unknown, b: unknown): boolean =>
  canonicalJson(toDocument(a ?? null)) === canonicalJson(toDocument(b ?? null));

/** The part that was changed without a right to it: a builder writes what the competitor lets them. */
const refusedPart = (
  actor: Actor,
  paperwork: Paperwork,
  draft: PaperworkDraft,
): Fault | undefined => {
  const rights = rightsOn(actor, paperwork);
  const before = paperwork.draft as unknown as PaperworkDraft;
  const answers = ({ answers: said, note, replies }: PaperworkDraft) => ({
    said,
    note,
    replies: replies ?? [],
  });
  if (!rights.includes('answers') && !same(answers(before), answers(draft)))
    return { pointer: '/draft/answers', detail: 'The competitor lets you write the sheets only.' };
  if (!rights.includes('sheets') && !same(before.sheets, draft.sheets))
    return {
      pointer: '/draft/sheets',
      detail: 'The competitor does not let you write the sheets.',
    };
  return undefined;
};

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
  const known = await findOwnPaperwork(deps.db, actor, paperworkId, false, 'see');
  if (known === undefined) return fail(absent());
  const { seriesId } = known;
  return performAct(
    deps,
    actor,
    { id: act, kind: 'save-draft', seriesId, input: { paperworkId, version, draft } },
    async ({ em, at }) => {
      const paperwork = await findOwnPaperwork(em, actor, paperworkId, true, 'see');
      if (paperwork === undefined) return fail(absent());
      if (!isWritable(paperwork.state)) {
        const detail = `This paperwork is ${STATE_WORDS[paperwork.state].toLowerCase()} and no longer written in.`;
        return fail(failure('not-in-this-state', detail));
      }
      if (paperwork.version !== version) return fail(stale());
      const refused = refusedPart(actor, paperwork, draft);
      if (refused !== undefined) return fail(invalid([refused]));
      paperwork.draft = draft as unknown as Record<string, unknown>;
      paperwork.updatedAt = at;
      paperwork.updatedBy = actor.personId;
      await em.flush();
      return ok({ version: paperwork.version, savedAt: at.toISOString() });
    },
  );
};
