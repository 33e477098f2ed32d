import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { openDatabase } from '@/adapters/database/orm';
import type { Actor } from '@/domain/access/permission';
import { createEvent } from '@/services/event/create-event';
import { enterCars } from '@/services/event/enter-cars';
import { auditLedger } from '@/services/ledger/audit/audit-ledger';
import { decidePaperwork } from '@/services/paperwork/decide-paperwork';
import { acknowledgeBulletin } from '@/services/rulebook/acknowledgement/acknowledge-bulletin';
import { findBulletinReach } from '@/services/rulebook/acknowledgement/find-bulletin-reach';
import { findSignOn } from '@/services/rulebook/acknowledgement/find-sign-on';
import { listOwnBulletins } from '@/services/rulebook/acknowledgement/list-own-bulletins';
import { recordSignOn } from '@/services/rulebook/acknowledgement/record-sign-on';
import { handedIn, openPaddock, type Paddock } from '../../support/paperwork';
import { openWorld, type World } from '../../support/world';
import { bulletinOf, clauseOf, must, publish } from './build';

let world: World;
let paddock: Paddock;
let eventId: string;
const EVENT = { startsAt: '2026-08-01T23:00:00.000Z', endsAt: '2026-08-02T04:00:00.000Z' };

/** The declared engine has 361.4 in³. */
const displacement = (max: string) => {
  const clause = clauseOf('3.1');
  if (clause.requirement?.kind !== 'limit') throw new Error('no limit');
  const requirement = { ...clause.requirement, max: { text: max, unit: 'in³' } };
  return { ...clause, words: `At most ${max} cubic inches.`, requirement };
};

const car = (carNumber: string, competitorName: string, competitorEmail = '') => ({
  id: paddock.uuid(),
  classId: paddock.classId,
  carNumber,
  competitorName,
  competitorEmail,
  engineReference: '',
  position: null,
});

const emailOf = async (actor: Actor): Promise<string> => {
  const [row] = await paddock
    .ports()
    .db.execute<{ email: string }[]>('select email from public.person where id = ?', [
      actor.personId,
    ]);
  return row?.email ?? '';
};

beforeAll(async () => {
  world = await openWorld();
  paddock = await openPaddock(world);
  const { official, seriesId, seasonId, uuid } = paddock;
  const { paperworkId } = await handedIn(paddock, '12J');
  const decision = { paperworkId, number: 1, decision: 'accepted' as const, remarks: [] };
  must(await decidePaperwork(paddock.ports(), official, { act: uuid(), ...decision }));
  eventId = uuid();
  must(
    await createEvent(paddock.ports(), official, {
      act: uuid(),
      seriesId,
      id: eventId,
      seasonId,
      slug: 'august',
      name: 'August night',
      track: 'Quarrel Fen Oval',
      zone: 'America/Chicago',
      protestMinutes: 30,
      ...EVENT,
    }),
  );
  must(
    await enterCars(paddock.ports(), official, {
      act: uuid(),
      seriesId,
      eventId,
      entries: [
        car('12J', 'Ada Lindqvist', await emailOf(paddock.competitor)),
        car('7', 'Teo Marsh', await emailOf(paddock.rival)),
        car('40', 'Wren Halloway'),
      ],
    } as Parameters<typeof enterCars>[2]),
  );
});
afterAll(() => world.close());

const reach = (number: number, actor = paddock.official) =>
  findBulletinReach(paddock.ports(), actor, { ...paddock, number });
const signOn = async () => {
  const found = must(await findSignOn(paddock.ports(), paddock.official, eventId));
  const [only] = found.classes;
  if (only === undefined) throw new Error('no class');
  return only;
};
const lines = async (kind: string) =>
  paddock
    .ports()
    .db.execute<{ line: string }[]>(
      'select line from record.ledger_line where series_id = ? and kind = ?',
      [paddock.seriesId, kind],
    );

describe('a bulletin that makes an engine illegal', () => {
  it('keeps which engine and why, and tells its owner and everybody else in the class', async () => {
    const bulletin = bulletinOf(displacement('361.0'), { kind: 'safety' }, 'Smaller');
    must(await publish(world, paddock, bulletin));
    const found = await reach(1);
    expect(found?.engines).toMatchObject([
      {
        carNumber: '12J',
        name: 'Car 12J, engine VR-2231',
        results: [{ clause: '3.1', heading: 'Displacement' }],
        owners: [{ name: 'Ada Lindqvist', mail: 'to-send', acknowledgedAt: null }],
      },
    ]);
    expect(found?.others).toMatchObject([{ name: 'Teo Marsh', mail: 'to-send' }]);
    const committed = await paddock.ports().db.execute<{ role: string; open: boolean }[]>(
      `select c.role, c.open from record.ledger_content c
       join record.ledger_line l on l.series_id = c.series_id and l.index = c.line_index
       where l.series_id = ? and l.kind = 'bulletin-published' order by c.role`,
      [paddock.seriesId],
    );
    expect(committed).toEqual([
      { role: 'bulletin', open: true },
      { role: 'engines', open: false },
      { role: 'rows', open: false },
    ]);
  });

  it('stays as it was found, though the paperwork changes afterwards', async () => {
    const { db } = paddock.ports();
    await db.execute(`update public.paperwork set state = 'withdrawn' where car_number = '12J'`);
    expect((await reach(1))?.engines).toHaveLength(1);
    await db.execute(`update public.paperwork set state = 'accepted' where car_number = '12J'`);
  });

  it('says of each message whether it went out, and why not', async () => {
    await paddock
      .ports()
      .db.execute(
        `update public.mail set state = 'bounced', answer = '550 no such mailbox' where kind = 'bulletin-affects-engine'`,
      );
    expect((await reach(1))?.engines[0]?.owners[0]).toMatchObject({
      mail: 'bounced',
      error: '550 no such mailbox',
    });
  });

  it('is nobody’s but the officials’ to see', async () => {
    expect(await reach(1, paddock.competitor)).toBeUndefined();
  });
});

describe('having read a bulletin', () => {
  const own = async (actor: Actor) => {
    const [first] = await listOwnBulletins(paddock.ports(), actor);
    if (first === undefined) throw new Error('no bulletin');
    return first;
  };
  const acknowledge = async (actor: Actor, change: object = {}) => {
    const { id, hash, seriesId } = await own(paddock.competitor);
    const input = { act: paddock.uuid(), seriesId, bulletinId: id, hash, ...change };
    return acknowledgeBulletin(paddock.ports(), actor, input);
  };

  it('is asked of those with paperwork or an entry in the class, with their engines', async () => {
    expect(await own(paddock.competitor)).toMatchObject({
      number: 1,
      title: 'Smaller',
      acknowledgedAt: null,
      engines: ['Car 12J, engine VR-2231'],
    });
    expect(await own(paddock.rival)).toMatchObject({ number: 1, engines: [] });
    expect(await listOwnBulletins(paddock.ports(), paddock.stranger)).toEqual([]);
  });

  it('is said of the document that was shown, once, and writes a line', async () => {
    expect(await acknowledge(paddock.competitor, { hash: 'ab'.repeat(32) })).toMatchObject({
      failure: { name: 'stale' },
    });
    const first = must(await acknowledge(paddock.competitor));
    world.clock.advance(60_000);
    expect(must(await acknowledge(paddock.competitor))).toEqual(first);
    expect(await lines('bulletin-acknowledged')).toHaveLength(1);
    const [row] = await paddock.ports().db.execute<{ hash: string; name: string }[]>(
      `select encode(a.hash, 'hex') as hash, a.name from record.bulletin_acknowledgement a
       join record.rule_publication p on p.id = a.bulletin_id and p.hash = a.hash`,
    );
    expect(row).toEqual({
      hash: (await own(paddock.competitor)).hash,
      name: paddock.competitor.name,
    });
    expect((await reach(1))?.engines[0]?.owners[0]?.acknowledgedAt).toBe(first.acknowledgedAt);
  });

  it('is nothing that somebody outside the series can say', async () => {
    expect(await acknowledge(paddock.official)).toMatchObject({ failure: { name: 'absent' } });
  });
});

describe('sign-on', () => {
  const record = async (carNumber: string, change: object = {}, actor = paddock.official) => {
    const { bulletins, entries } = await signOn();
    const entry = entries.find((one) => one.entry.carNumber === carNumber);
    return recordSignOn(paddock.ports(), actor, {
      act: paddock.uuid(),
      seriesId: paddock.seriesId,
      eventId,
      entryId: entry?.entry.id ?? '',
      bulletinIds: bulletins.map((one) => one.id),
      name: 'Wren Halloway',
      ...change,
    });
  };
  const readBy = async (carNumber: string) =>
    (await signOn()).entries
      .find((one) => one.entry.carNumber === carNumber)
      ?.read.map((row) => row.by?.name ?? null);

  it('lists each entry with the bulletins in force and who has read them', async () => {
    const later = { kind: 'instant' as const, at: EVENT.endsAt };
    must(await publish(world, paddock, bulletinOf(clauseOf('4.4'), later, 'After the event')));
    const listed = await signOn();
    expect(listed.bulletins.map((one) => one.number)).toEqual([1]);
    expect(listed.complete).toBe(1);
    expect(await readBy('12J')).toEqual(['Ada Lindqvist']);
    expect(await readBy('7')).toEqual([null]);
  });

  it('takes the word of whoever stands there, by name and time', async () => {
    const at = world.clock.now().toISOString();
    expect(must(await record('40')).recorded).toBe(1);
    expect(await readBy('40')).toEqual(['Wren Halloway']);
    const { entries } = await signOn();
    const row = entries.find((one) => one.entry.carNumber === '40');
    expect(row?.read[0]?.by).toMatchObject({ way: 'in-person', at });
    // Recorded again by somebody else: the first one stands.
    expect(must(await record('40', { name: 'Another' })).recorded).toBe(0);
    expect(await lines('bulletin-acknowledged')).toHaveLength(2);
  });

  it('of an entry with an account counts for the person at the next event too', async () => {
    must(await record('7', { name: 'Teo’s crew chief' }));
    expect(await listOwnBulletins(paddock.ports(), paddock.rival)).toMatchObject([
      { number: 2, acknowledgedAt: null },
      { number: 1, acknowledgedAt: world.clock.now().toISOString() },
    ]);
  });

  it('asks for a name and a bulletin of this class, and for an official', async () => {
    expect(await record('40', { name: ' ', bulletinIds: [] })).toMatchObject({
      failure: { faults: [{ pointer: '/name' }, { pointer: '/bulletinIds' }] },
    });
    expect(await record('40', { bulletinIds: [paddock.uuid()] })).toMatchObject({
      failure: { name: 'absent' },
    });
    expect(await record('40', {}, paddock.competitor)).toMatchObject({
      failure: { name: 'absent' },
    });
    expect(await findSignOn(paddock.ports(), paddock.competitor, eventId)).toMatchObject({
      failure: { name: 'absent' },
    });
  });

  it('asks for the bulletins that count at the event, a safety bulletin during it included', async () => {
    world.clock.set('2026-08-02T00:00:00.000Z');
    must(await publish(world, paddock, bulletinOf(clauseOf('4.1'), { kind: 'safety' }, 'Now')));
    expect((await signOn()).bulletins.map((one) => one.number)).toEqual([1, 3]);
  });
});

it('what was acknowledged, and which engines were made illegal, cannot be changed unseen', async () => {
  const superuser = await openDatabase(world.database.superuserUrl, 2);
  const audited = async (sql: string): Promise<readonly string[]> => {
    const em = superuser.em.fork();
    await em.begin();
    try {
      await em.execute(sql);
      const asked = { seriesId: paddock.seriesId, heads: [], keys: [] };
      const { faults } = await auditLedger({ db: em, objects: paddock.objects }, asked);
      return faults.map((fault) => fault.where);
    } finally {
      await em.rollback();
    }
  };
  const untouched = await audited('select 1');
  expect(untouched.filter((where) => where.includes('bulletin'))).toEqual([]);
  for (const [table, change] of [
    ['bulletin_acknowledgement', `name = 'Somebody else'`],
    ['bulletin_acknowledgement', `acknowledged_at = acknowledged_at + interval '1 second'`],
    ['bulletin_engine', `results = '[]'`],
    ['bulletin_engine', `car_number = '1'`],
  ]) {
    const found = await audited(`update record.${table} set ${change}`);
    expect([table, found.some((where) => where.includes(`record.${table}`))]).toEqual([
      table,
      true,
    ]);
  }
  await superuser.close();
});
