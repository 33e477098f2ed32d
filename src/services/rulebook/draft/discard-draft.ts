import { LockMode } from '@mikro-orm/core';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, failure, stale } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { RulebookDraft } from '@/entities/series/rulebook-draft';
import { performAct } from '../../act/perform-act';
import type { Ports } from '../../ports';

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
      const draft = await em.findOne(
        RulebookDraft,
        { seriesId, id: draftId },
        { lockMode: LockMode.PESSIMISTIC_WRITE },
      );
      if (draft === null) return fail(absent());
      if (draft.publishedAt) {
        return fail(failure('not-in-this-state', 'This draft has been published and stays so.'));
      }
      if (draft.version !== version) return fail(stale());
      em.remove(draft);
      return ok({ classId: draft.classId });
    },
  );
};
