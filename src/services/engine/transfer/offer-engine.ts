import { LockMode } from '@mikro-orm/postgresql';
import type { Actor } from '@/domain/access/permission';
import { absent, type Failure, type Fault, failure, invalid } from '@/domain/failure';
import { isId } from '@/domain/is-id';
import { fail, ok, type Result } from '@/domain/result';
import { Engine } from '@/entities/paperwork/engine';
import { EngineOffer } from '@/entities/paperwork/engine-offer';
import { performAct } from '../../act/perform-act';
import { queueMail } from '../../mail/queue-mail';
import type { Ports } from '../../ports';
import { newToken, tokenHash } from '../../session/token';
import { holderOf } from '../engine-holder';

const OFFER_DAYS = 14;
const DAY = 86_400_000;

export interface NewOffer {
  readonly act: string;
  readonly engineId: string;
  readonly kind: 'sold' | 'lent';
  readonly email: string;
  /** Of a loan: the instant it ends, ISO 8601 in UTC. */
  readonly untilAt: string | null;
}

const faultsOf = ({ kind, email, untilAt }: NewOffer, now: Date): readonly Fault[] => [
  ...(/^[^\s@]+@[^\s@]+\.[^\s@]+$/.test(email)
    ? []
    : [{ pointer: '/email', detail: 'Give an e-mail address, such as name@example.org.' }]),
  ...(kind === 'lent' && !(Date.parse(untilAt ?? '') > now.getTime())
    ? [{ pointer: '/until', detail: 'A loan ends: say on which day to come.' }]
    : []),
];

/** Offers the actor's own engine to somebody, to keep or for a time. It changes hands when they accept. */
export const offerEngine = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs' | 'site'>,
  actor: Actor,
  input: NewOffer,
): Promise<Result<{ readonly offerId: string }, Failure>> => {
  const { act: id, engineId, kind } = input;
  const own = { id: engineId, ownerId: actor.personId };
  if (!isId(engineId) || (await deps.db.count(Engine, own)) === 0) return fail(absent());
  const email = input.email.trim().toLowerCase();
  const untilAt = kind === 'lent' ? input.untilAt : null;
  const faults = faultsOf({ ...input, email, untilAt }, deps.clock.now());
  if (faults.length > 0) return fail(invalid(faults));
  return performAct(
    deps,
    actor,
    { id, kind: 'offer-engine', seriesId: null, input: { engineId, kind, email, untilAt } },
    async (act) => {
      const { em, at } = act;
      const engine = await em.findOne(Engine, own, { lockMode: LockMode.PESSIMISTIC_WRITE });
      if (engine === null) return fail(absent());
      if (holderOf(engine, at) !== actor.personId) {
        const detail = `${engine.reference} is lent out. It can be offered once it is back.`;
        return fail(failure('not-in-this-state', detail));
      }
      const before = await em.find(EngineOffer, { engineId, acceptedAt: null, withdrawnAt: null });
      if (before.some(({ expiresAt }) => expiresAt > at)) {
        const detail = `${engine.reference} is offered to somebody already. Take that offer back first.`;
        return fail(failure('not-in-this-state', detail));
      }
      for (const old of before) old.withdrawnAt = at;
      await em.flush();
      const token = newToken(deps.random);
      const offerId = deps.random.uuid();
      em.persist(
        em.create(EngineOffer, {
          id: offerId,
          engineId,
          fromId: actor.personId,
          email,
          kind,
          untilAt: untilAt === null ? null : new Date(untilAt),
          tokenHash: tokenHash(token),
          offeredAt: at,
          expiresAt: new Date(at.getTime() + OFFER_DAYS * DAY),
        }),
      );
      queueMail(deps, em, act, {
        seriesId: null,
        personId: null,
        address: email,
        kind: 'engine-offer',
        subject:
          kind === 'sold'
            ? `${actor.name} hands engine ${engine.reference} over to you`
            : `${actor.name} lends you engine ${engine.reference}`,
        paragraphs: [
          kind === 'sold'
            ? `${actor.name} has entered you as the new owner of engine ${engine.reference}. It is yours in Tagwire once you accept.`
            : `${actor.name} lends you engine ${engine.reference} until ${untilAt?.slice(0, 10)}. You declare it once you accept; it goes back by itself on that day.`,
          'Its seals and what was accepted of it come with it. Build sheets and cam cards do not.',
          `The offer is open for ${OFFER_DAYS} days.`,
        ],
        next: 'read the offer, then accept it, or let it lapse.',
        link: { label: 'See the offer', path: `/invitations/engine/${token}` },
      });
      return ok({ offerId });
    },
  );
};
