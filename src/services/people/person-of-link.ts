import type { EntityManager } from '@mikro-orm/postgresql';
import { type Failure, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { Person } from '@/entities/people/person';
import type { Ports } from '../ports';

/**
 * Who holds a link that was sent to an address: holding it proves the address. A person not known yet
 * is added under the name given.
 */
export const personOfLink = async (
  deps: Pick<Ports, 'clock' | 'random'>,
  em: EntityManager,
  link: { readonly email: string; readonly name: string },
): Promise<Result<Person, Failure>> => {
  const known = await em.findOne(Person, { email: link.email });
  if (known !== null) return ok(known);
  const name = link.name.trim();
  if (name === '' || name.length > 120) {
    return fail(invalid([{ pointer: '/name', detail: 'Give your name, as it shall be printed.' }]));
  }
  const person = em.create(Person, {
    id: deps.random.uuid(),
    name,
    email: link.email,
    siteAdmin: false,
    createdAt: deps.clock.now(),
  });
  em.persist(person);
  await em.flush();
  return ok(person);
};
