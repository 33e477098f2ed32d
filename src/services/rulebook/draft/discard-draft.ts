import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { performAct } from '../../act/perform-act';
import type { Ports } from '../../ports';
import { lockDraft } from './lock-draft';

/** Throws an unpublished draft away, if it is still the one that was looked at. */
export const discardDraft = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs'>,
  actor: Actor,
  input: {
    readonly act: string;
    readonly seriesId: string;
    readonly draftId: string;
    readonly version: number;
  },
): Promise<Result<{ readonly classId: string }, Failure>> => {
  if (!may(actor, 'rulebook.write', input.seriesId)) return fail(absent());
  const { act: id, seriesId, draftId, version } = input;
  return performAct(
    deps,
    actor,
    { id, kind: 'discard-draft', seriesId, input: { draftId, version } },
    async ({ em }) => {
      const found = await lockDraft(em, { seriesId, id: draftId }, version);
      if (!found.ok) return found;
      const draft = found.value;
      em.remove(draft);
      return ok({ classId: draft.classId });
    },
  );
};
