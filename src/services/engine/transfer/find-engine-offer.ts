import type { EntityManager } from '@mikro-orm/postgresql';
import { type Failure, failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { Engine } from '@/entities/paperwork/engine';
import { EngineOffer } from '@/entities/paperwork/engine-offer';
import { Person } from '@/entities/people/person';
import type { Ports } from '../../ports';
import { tokenHash } from '../../session/token';

export interface EngineOfferSeen {
  readonly from: string;
  readonly email: string;
  readonly kind: 'sold' | 'lent';
  readonly untilAt: string | undefined;
  readonly reference: string;
  readonly blockCasting: string;
  readonly serial: string;
  /** Whether the address is somebody's here already. */
  readonly known: boolean;
}

export const offerSpent = (): Failure =>
  failure('link-spent', 'This offer was accepted, taken back, or is too old.');

/** The open offer that a link belongs to. */
export const findOpenOffer = (em: EntityManager, token: string, now: Date) =>
  em.findOne(EngineOffer, {
    tokenHash: tokenHash(token),
    acceptedAt: null,
    withdrawnAt: null,
    expiresAt: { $gt: now },
  });

/** What is offered, for whoever holds the link. */
export const findEngineOffer = async (
  { db, clock }: Pick<Ports, 'db' | 'clock'>,
  token: string,
): Promise<Result<EngineOfferSeen, Failure>> => {
  const offer = await findOpenOffer(db, token, clock.now());
  if (offer === null) return fail(offerSpent());
  const engine = await db.findOneOrFail(Engine, { id: offer.engineId });
  const from = await db.findOneOrFail(Person, { id: offer.fromId });
  const { email, kind } = offer;
  const { reference, blockCasting, serial } = engine;
  return ok({
    from: from.name,
    email,
    kind,
    untilAt: offer.untilAt?.toISOString(),
    reference,
    blockCasting,
    serial,
    known: (await db.count(Person, { email })) > 0,
  });
};
