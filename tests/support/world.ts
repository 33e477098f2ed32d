import type { MikroORM } from '@mikro-orm/postgresql';
import { openDatabase } from '@/adapters/database/orm';
import { openJobs } from '@/adapters/jobs';
import { systemRandom } from '@/adapters/system/system';
import type { Actor, Role } from '@/domain/access/permission';
import { Person } from '@/entities/people/person';
import type { Clock, Ports } from '@/services/ports';
import { createSeries } from '@/services/series/create-series';
import { createTestDatabase, type TestDatabase } from './database';

/** A clock that stands still until it is told to move. */
export class FakeClock implements Clock {
  constructor(private instant = new Date('2026-07-11T20:00:00.000Z')) {}
  now(): Date {
    return this.instant;
  }
  set(iso: string): void {
    this.instant = new Date(iso);
  }
  advance(milliseconds: number): void {
    this.instant = new Date(this.instant.getTime() + milliseconds);
  }
}

const missing = (name: string) =>
  new Proxy({}, { get: () => () => Promise.reject(new Error(`${name} is not part of this test`)) });

/** The services' world on a real, empty, migrated PostgreSQL of the test file's own. */
export interface World {
  readonly database: TestDatabase;
  readonly orm: MikroORM;
  readonly clock: FakeClock;
  /** Ports of one request; what a test does not name is refused when used. */
  ports(overrides?: Partial<Ports>): Ports;
  close(): Promise<void>;
}

export const openWorld = async (fixed: Partial<Ports> = {}): Promise<World> => {
  const database = await createTestDatabase();
  const orm = await openDatabase(database.appUrl);
  const clock = new FakeClock();
  const { boss, jobs } = await openJobs(database.appUrl, () => undefined);
  return {
    database,
    orm,
    clock,
    ports: (overrides = {}) => ({
      db: orm.em.fork(),
      clock,
      random: systemRandom,
      jobs,
      site: { publicUrl: 'http://127.0.0.1:1', mailFrom: 'Tagwire <tagwire@example.org>' },
      objects: missing('the object store') as Ports['objects'],
      uploads: missing('uploads in parts') as Ports['uploads'],
      images: missing('image work') as Ports['images'],
      mailer: missing('mail') as Ports['mailer'],
      identity: missing('the identity provider') as Ports['identity'],
      notices: missing('the notice printer') as Ports['notices'],
      rulebooks: missing('the rulebook printer') as Ports['rulebooks'],
      tags: missing('the tag printer') as Ports['tags'],
      nonCompliances: missing('the printer of non-compliance') as Ports['nonCompliances'],
      keys: missing('the ledger’s keys') as Ports['keys'],
      barn: missing('the barn’s feed') as Ports['barn'],
      heads: missing('the memory of signed heads') as Ports['heads'],
      recordState: { findObstacle: async () => undefined, doubt: () => undefined },
      ...fixed,
      ...overrides,
    }),
    close: async () => {
      await boss.stop({ graceful: false, wait: true });
      await orm.close();
      await database.drop();
    },
  };
};

/** Adds a person and says who they are in which series, as a signed-in actor. */
export const addActor = async (
  world: World,
  name: string,
  standings: readonly { readonly seriesId: string; readonly role: Role }[] = [],
  siteAdmin = false,
): Promise<Actor> => {
  const { db, random, clock } = world.ports();
  const personId = random.uuid();
  const email = `${name.toLowerCase().replace(/[^a-z]+/g, '.')}.${personId.slice(-6)}@example.org`;
  db.persist(db.create(Person, { id: personId, name, email, siteAdmin, createdAt: clock.now() }));
  await db.flush();
  for (const { seriesId, role } of standings) {
    await db.execute(
      'insert into public.membership (series_id, id, person_id, role, since) values (?, ?, ?, ?, ?)',
      [seriesId, random.uuid(), personId, role, clock.now()],
    );
  }
  return {
    personId,
    name,
    sessionId: random.uuid(),
    authenticatedAt: clock.now().toISOString(),
    siteAdmin,
    standings,
  };
};

/** A series with its ledger, opened by a site administrator. */
export const addSeries = async (world: World, slug = 'corran-valley'): Promise<string> => {
  const admin = await addActor(world, 'Administrator', [], true);
  const ports = world.ports();
  const id = ports.random.uuid();
  const opened = await createSeries(ports, admin, {
    act: ports.random.uuid(),
    id,
    slug,
    name: 'Corran Valley Saturday Series',
    zone: 'America/Chicago',
    currency: 'USD',
    protestMinutes: 30,
    appealDays: 3,
    bondMinor: 25_000,
    appealsAddress: 'Race office, Quarrel Fen Oval',
  });
  if (!opened.ok) throw new Error(opened.failure.detail);
  return id;
};
