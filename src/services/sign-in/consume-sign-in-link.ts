import { type Failure, failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { Person } from '@/entities/people/person';
import { SignInLink } from '@/entities/people/sign-in-link';
import type { Ports } from '../ports';
import { endSession, startSession } from '../session/start-session';
import { tokenHash } from '../session/token';

const spent = () =>
  fail(failure('link-spent', 'This link was used already or is too old. Ask for a new one.'));

/** Uses up the link and starts a session; of several attempts at once exactly one succeeds. */
export const consumeSignInLink = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random'>,
  input: {
    readonly token: string;
    readonly agent: string;
    readonly previousToken: string | undefined;
  },
): Promise<Result<{ readonly token: string; readonly returnTo: string }, Failure>> =>
  deps.db.fork().transactional(async (em) => {
    const now = deps.clock.now();
    const used = await em.nativeUpdate(
      SignInLink,
      { tokenHash: tokenHash(input.token), consumedAt: null, expiresAt: { $gt: now } },
      { consumedAt: now },
    );
    if (used !== 1) return spent();
    const link = await em.findOneOrFail(SignInLink, { tokenHash: tokenHash(input.token) });
    const person = await em.findOne(Person, { email: link.email });
    if (person === null) return spent();
    await endSession(deps, em, input.previousToken);
    const token = startSession(deps, em, {
      personId: person.id,
      method: 'email-link',
      agent: input.agent,
    });
    return ok({ token, returnTo: link.returnTo });
  });
