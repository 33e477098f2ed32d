import type { EntityManager } from '@mikro-orm/postgresql';
import { type Failure, failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { Identity } from '@/entities/people/identity';
import { Person } from '@/entities/people/person';
import type { Ports, ProviderPerson } from '../ports';
import { endSession, startSession } from '../session/start-session';

type Deps = Pick<Ports, 'db' | 'clock' | 'random' | 'identity'>;

export interface ProviderReturn {
  readonly code: string;
  readonly verifier: string;
  readonly nonce: string;
  readonly agent: string;
  readonly previousToken: string | undefined;
}

const findOrAddPerson = async (
  deps: Deps,
  em: EntityManager,
  provided: ProviderPerson,
): Promise<Person | undefined> => {
  const { issuer, subject, email } = provided;
  const identity = await em.findOne(Identity, { issuer, subject });
  if (identity !== null) return em.findOneOrFail(Person, { id: identity.personId });
  // An address that the provider has not verified proves nothing about who holds it.
  if (!provided.emailVerified) return undefined;
  const now = deps.clock.now();
  let person = await em.findOne(Person, { email });
  if (person === null) {
    person = em.create(Person, {
      id: deps.random.uuid(),
      name: provided.name.trim().slice(0, 120) || email,
      email,
      siteAdmin: false,
      createdAt: now,
    });
    em.persist(person);
    await em.flush();
  }
  em.persist(em.create(Identity, { issuer, subject, personId: person.id, createdAt: now }));
  return person;
};

/** Turns the identity provider's answer into a session of ours. */
export const finishProviderSignIn = async (
  deps: Deps,
  input: ProviderReturn,
): Promise<Result<{ readonly token: string }, Failure>> => {
  let provided: ProviderPerson;
  try {
    provided = await deps.identity.finish(input);
  } catch {
    return fail(
      failure('link-spent', 'The sign-in could not be confirmed. Start it once more from here.'),
    );
  }
  return deps.db.fork().transactional(async (em) => {
    const person = await findOrAddPerson(deps, em, provided);
    if (person === undefined) {
      return fail(
        failure(
          'absent',
          'The identity provider has not verified your e-mail address. Use the e-mail link instead.',
        ),
      );
    }
    await endSession(deps, em, input.previousToken);
    const token = startSession(deps, em, {
      personId: person.id,
      method: 'identity-provider',
      agent: input.agent,
    });
    return ok({ token });
  });
};
