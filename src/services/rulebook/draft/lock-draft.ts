import { type EntityManager, LockMode } from '@mikro-orm/postgresql';
import { absent, type Failure, failure, stale } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { RulebookDraft } from '@/entities/series/rulebook-draft';

/** A draft locked for a change: it stands as it was seen, and is not published. */
export const lockDraft = async (
  em: EntityManager,
  where: {
    readonly seriesId: string;
    readonly id: string;
    readonly kind?: RulebookDraft['kind'];
  },
  version: number,
  /** Why a published one is refused. */
  published = 'This draft has been published and stays so.',
): Promise<Result<RulebookDraft, Failure>> => {
  const draft = await em.findOne(RulebookDraft, where, { lockMode: LockMode.PESSIMISTIC_WRITE });
  if (draft === null) return fail(absent());
  if (draft.publishedAt) return fail(failure('not-in-this-state', published));
  return draft.version === version ? ok(draft) : fail(stale());
};
