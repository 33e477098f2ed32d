import type { EntityManager } from '@mikro-orm/postgresql';
import { Session } from '@/entities/people/session';
import type { Ports } from '../ports';
import { newToken, tokenHash } from './token';

export const SESSION_SECONDS = 14 * 24 * 3600;

/** A new session inside the running transaction; the token is told once, here. */
export const startSession = (
  deps: Pick<Ports, 'clock' | 'random'>,
  em: EntityManager,
  person: { readonly personId: string; readonly method: Session['method']; readonly agent: string },
): string => {
  const now = deps.clock.now();
  const token = newToken(deps.random);
  em.persist(
    em.create(Session, {
      id: deps.random.uuid(),
      tokenHash: tokenHash(token),
      personId: person.personId,
      method: person.method,
      agent: person.agent.slice(0, 200),
      createdAt: now,
      authenticatedAt: now,
      seenAt: now,
      expiresAt: new Date(now.getTime() + SESSION_SECONDS * 1000),
    }),
  );
  return token;
};

/** Ends the session a sign-in replaces, so that a token known before it is worth nothing after. */
export const endSession = async (
  deps: Pick<Ports, 'clock'>,
  em: EntityManager,
  token: string | undefined,
): Promise<void> => {
  if (token === undefined) return;
  await em.nativeUpdate(
    Session,
    { tokenHash: tokenHash(token), revokedAt: null },
    { revokedAt: deps.clock.now() },
  );
};
