import type { Role } from '@/domain/access/permission';
import { Membership } from '@/entities/people/membership';
import { Person } from '@/entities/people/person';
import { createSeries } from '@/services/series/create-series';
import { ADMINISTRATOR, EVERYBODY } from '../people';
import { done, type Stage, ZONE } from '../stage';

/** The people, the series they take part in, and their roles in it. */
export const writePeople = async (stage: Stage): Promise<{ readonly seriesId: string }> => {
  const { db, clock } = stage.ports();
  const seriesId = stage.uuid();
  const createdAt = clock.now();
  const ids = new Map<string, string>();
  for (const person of EVERYBODY) {
    const id = stage.uuid();
    ids.set(person.subject, id);
    const { name, email, siteAdmin = false } = person;
    db.persist(db.create(Person, { id, name, email, siteAdmin, createdAt }));
    stage.learn(person, {
      personId: id,
      name,
      sessionId: stage.uuid(),
      authenticatedAt: createdAt.toISOString(),
      siteAdmin,
      standings: person.roles.map((role: Role) => ({ seriesId, role })),
    });
  }
  await db.flush();
  done(
    'open the series',
    await createSeries(stage.ports(), stage.actor(ADMINISTRATOR), {
      act: stage.uuid(),
      id: seriesId,
      slug: 'corran-valley',
      name: 'Corran Valley Saturday Series',
      zone: ZONE,
      currency: 'USD',
      protestMinutes: 4320,
      appealDays: 3,
      bondMinor: 25_000,
      appealsAddress: 'Race office, Quarrel Fen Oval',
    }),
  );
  for (const person of EVERYBODY) {
    for (const role of person.roles) {
      db.persist(
        db.create(Membership, {
          seriesId,
          id: stage.uuid(),
          personId: ids.get(person.subject) ?? '',
          role,
          grantedBy: null,
          since: createdAt,
        }),
      );
    }
  }
  await db.flush();
  return { seriesId };
};
