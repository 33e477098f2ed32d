import { LockMode } from '@mikro-orm/postgresql';
import { type Failure, failure, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { Engine } from '@/entities/paperwork/engine';
import { Person } from '@/entities/people/person';
import { performAct } from '../../act/perform-act';
import { queueMail } from '../../mail/queue-mail';
import type { LinkHolder } from '../../people/builder/accept-builder-invitation';
import { personOfLink } from '../../people/person-of-link';
import type { Ports } from '../../ports';
import { endSession, startSession } from '../../session/start-session';
import { tokenHash } from '../../session/token';
import { holderOf } from '../engine-holder';
import { findOpenOffer, offerSpent } from './find-engine-offer';
import { recordTransfer } from './transfer-line';

type Deps = Pick<Ports, 'db' | 'clock' | 'random' | 'jobs' | 'site'>;

/** Whoever the offer was sent to, known by its link. */
const receiverOf = (deps: Deps, input: LinkHolder) =>
  deps.db.fork().transactional(async (em): Promise<Result<Person, Failure>> => {
    const offer = await findOpenOffer(em, input.token, deps.clock.now());
    if (offer === null) return fail(offerSpent());
    return personOfLink(deps, em, { email: offer.email, name: input.name });
  });

/**
 * The receiver takes an engine over, to keep or until the loan's end. From here on they declare it; what
 * the former owner handed in stays the former owner's, and nothing of its sheets goes along.
 */
export const acceptEngineOffer = async (
  deps: Deps,
  input: LinkHolder & {
    readonly act: string;
    /** The new owner's own name for it. */
    readonly reference: string;
  },
): Promise<Result<{ readonly engineId: string; readonly token: string }, Failure>> => {
  const reference = input.reference.trim();
  const receiver = await receiverOf(deps, input);
  if (!receiver.ok) return receiver;
  const { id: personId, name } = receiver.value;
  const accepted = await performAct(
    deps,
    { personId },
    {
      id: input.act,
      kind: 'accept-engine-offer',
      seriesId: null,
      input: { offer: tokenHash(input.token).toString('hex'), reference },
    },
    async (act) => {
      const { em, at } = act;
      const offer = await findOpenOffer(em, input.token, at);
      if (offer === null) return fail(offerSpent());
      const engine = await em.findOneOrFail(
        Engine,
        { id: offer.engineId },
        { lockMode: LockMode.PESSIMISTIC_WRITE },
      );
      if (engine.ownerId !== offer.fromId || holderOf(engine, at) !== offer.fromId)
        return fail(offerSpent());
      if (personId === offer.fromId) {
        const detail = 'This engine is yours already.';
        return fail(failure('not-in-this-state', detail));
      }
      if (offer.kind === 'lent' && offer.untilAt && offer.untilAt <= at) return fail(offerSpent());
      if (offer.kind === 'sold') {
        const known = await em.count(Engine, { ownerId: personId, reference });
        if (reference === '' || reference.length > 40 || known > 0) {
          const detail =
            known > 0
              ? `You have an engine named ${reference} already. Give this one another name.`
              : 'Give the engine your own name, 1 to 40 characters.';
          return fail(invalid([{ pointer: '/reference', detail }]));
        }
        Object.assign(engine, { ownerId: personId, reference, holderId: null, heldUntil: null });
      } else Object.assign(engine, { holderId: personId, heldUntil: offer.untilAt });
      Object.assign(offer, { acceptedAt: at, acceptedBy: personId });
      const { kind, fromId, untilAt = null } = offer;
      const transfer = { engineId: engine.id, kind, fromId, toId: personId, untilAt };
      await recordTransfer(act, { id: deps.random.uuid(), ...transfer });
      const from = await em.findOneOrFail(Person, { id: fromId });
      queueMail(deps, em, act, {
        seriesId: null,
        personId: fromId,
        address: from.email,
        kind: 'engine-accepted',
        subject: `${name} accepted engine ${engine.reference}`,
        paragraphs: [
          kind === 'sold'
            ? `${name} accepted the engine on ${at.toISOString()} and declares it from now on.`
            : `${name} accepted the loan on ${at.toISOString()}; it ends on ${untilAt?.toISOString().slice(0, 10)}.`,
          'What you handed in of it stays yours. New paperwork of it is not open to you.',
        ],
        next: 'nothing to do.',
        link: { label: 'Your paddock', path: '/paddock' },
      });
      return ok({ engineId: engine.id });
    },
  );
  if (!accepted.ok) return accepted;
  const token = await deps.db.fork().transactional(async (em) => {
    await endSession(deps, em, input.previousToken);
    return startSession(deps, em, { personId, method: 'email-link', agent: input.agent });
  });
  return ok({ ...accepted.value, token });
};
