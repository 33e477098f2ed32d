import type { EntityManager } from '@mikro-orm/postgresql';
import type { Actor } from '@/domain/access/permission';
import { type Failure, failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import type { Paperwork } from '@/entities/paperwork/paperwork';
import type { Guardianship } from '@/entities/people/guardianship';
import { Person } from '@/entities/people/person';
import { holdsEngine } from '../engine/engine-holder';
import { FRESH_MINUTES, isFresh } from '../inspection/report/sign-report';
import { findGuardian } from '../people/find-guardian';

/** How whoever hands in proved who they are: by a session, or by a link sent to their address just now. */
export type SignedBy = 'session' | 'e-mailed-link';

const notTheirs = (): Failure =>
  failure(
    'not-in-this-state',
    'This engine is with somebody else now: it was sold, lent or returned. What was handed in before is kept.',
  );

const guardianSigns = ({ guardianName }: Guardianship): Failure =>
  failure(
    'not-in-this-state',
    `This competitor is under age: ${guardianName} signs and hands in. Ask for the signature; it goes out by e-mail.`,
  );

const signInAnew = (): Failure =>
  failure(
    'fresh-sign-in-required',
    `To sign for somebody under age, sign in once more: within the last ${FRESH_MINUTES} minutes.`,
  );

/**
 * Whether this person may hand in this paperwork now: the engine is with the competitor, and for one who
 * is under age the guardian signs, freshly signed in. Gives the guardianship it is signed under, if any.
 */
export const maySign = async (
  em: EntityManager,
  actor: Actor,
  { seriesId, competitorId, engineId }: Paperwork,
  at: Date,
  by: SignedBy,
): Promise<Result<Guardianship | undefined, Failure>> => {
  if (!(await holdsEngine(em, engineId, competitorId, at))) return fail(notTheirs());
  const guardian = await findGuardian(em, seriesId, competitorId);
  if (guardian === undefined) return ok(undefined);
  const own = { id: actor.personId, email: guardian.guardianEmail };
  if (guardian.guardianId !== actor.personId && (await em.count(Person, own)) === 0)
    return fail(guardianSigns(guardian));
  if (by === 'session' && !isFresh(actor, at)) return fail(signInAnew());
  return ok(guardian);
};
