import type { Actor } from '@/domain/access/permission';
import { absent, type Failure } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { fail, ok, type Result } from '@/domain/result';
import { EngineOffer } from '@/entities/paperwork/engine-offer';
import { type ActDeps, performAct } from '../../act/perform-act';

/** Takes back an offer that nobody has accepted yet. */
export const takeOfferBack = async (
  deps: ActDeps,
  actor: Actor,
  { act: id, offerId }: { readonly act: string; readonly offerId: string },
): Promise<Result<null, Failure>> => {
  const open = { id: offerId, fromId: actor.personId, acceptedAt: null, withdrawnAt: null };
  if (!isId(offerId) || (await deps.db.count(EngineOffer, open)) === 0) return fail(absent());
  return performAct(
    deps,
    actor,
    { id, kind: 'take-offer-back', seriesId: null, input: { offerId } },
    async ({ em, at }) =>
      (await em.nativeUpdate(EngineOffer, open, { withdrawnAt: at })) === 1
        ? ok(null)
        : fail(absent()),
  );
};
