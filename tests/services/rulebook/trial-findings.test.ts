import type { MikroORM } from '@mikro-orm/postgresql';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { openDatabase } from '@/adapters/database/orm';
import { toHex } from '@/domain/ledger/bytes';
import { signReport } from '@/services/inspection/report/sign-report';
import { previewBulletin } from '@/services/rulebook/bulletin/preview-bulletin';
import { tryEdition } from '@/services/rulebook/draft/try-edition';
import {
  fileOf,
  get,
  openInspection,
  openRaceNight,
  type RaceNight,
  rowsFor,
  send,
} from '../../support/bay';
import { openWorld, type World } from '../../support/world';
import { bulletinOf, clauseOf, tappetContent } from './build';

let world: World;
let night: RaceNight;
let superuser: MikroORM;

const inch = (text: string) => ({ text, unit: 'in' });
const LARGE = ['7', '12J', '99'];
/** More than are read together at once. */
const COPIES = 117;

/** A closed inspection in which one lifter measured this much. */
const inspected = async (carNumber: string, lifter: string): Promise<string> => {
  const id = await openInspection(world, night, carNumber);
  const row = rowsFor(world, night).reading({ value: inch(lifter) });
  get(await send(world, night.inspector, id, [row]));
  const head = toHex((await fileOf(world, night.inspector, id)).chain.head);
  const inspector = { ...night.inspector, authenticatedAt: world.clock.now().toISOString() };
  const act = world.ports().random.uuid();
  get(await signReport(world.ports(), inspector, { act, inspectionId: id, head }));
  return id;
};

/** Copies of a closed inspection, each for a car of its own: `C1`, `C2`, … */
const copy = (inspectionId: string, count: number) =>
  superuser.em.fork().transactional(async (em) => {
    await em.execute('set local session_replication_role = replica');
    const columns = async (table: string) => {
      const [schema, name] = table.split('.');
      const rows = await em.execute<{ name: string }[]>(
        `select column_name as name from information_schema.columns
         where table_schema = ? and table_name = ? order by ordinal_position`,
        [schema, name],
      );
      return rows.map((row) => row.name);
    };
    await em.execute(
      `create temp table made on commit drop as
       select n, gen_random_uuid() as inspection, gen_random_uuid() as entry
       from generate_series(1, ?) n`,
      [count],
    );
    const put = async (table: string, changed: Readonly<Record<string, string>>, where: string) => {
      const names = await columns(table);
      await em.execute(
        `insert into ${table} (${names.join(', ')})
         select ${names.map((name) => changed[name] ?? `s.${name}`).join(', ')}
         from ${table} s, made where ${where}`,
        [inspectionId],
      );
    };
    await put(
      'public.entry',
      { id: 'made.entry', car_number: "'C' || made.n" },
      's.id = (select entry_id from public.inspection where id = ?)',
    );
    await put('public.inspection', { id: 'made.inspection', entry_id: 'made.entry' }, 's.id = ?');
    const id = 'gen_random_uuid()';
    await put('record.reading', { id, inspection_id: 'made.inspection' }, 's.inspection_id = ?');
  });

beforeAll(async () => {
  world = await openWorld();
  night = await openRaceNight(world);
  superuser = await openDatabase(world.database.superuserUrl, 2);
  for (const car of LARGE) await inspected(car, '0.8425');
  await copy(await inspected('1', '0.8418'), COPIES);
  // Not closed: it is not tried.
  await openInspection(world, night, '50');
});
afterAll(async () => {
  await superuser.close();
  await world.close();
});

/** The body size with no room above its nominal. */
const tight = () => {
  const clause = clauseOf('4.2');
  if (clause.requirement?.kind !== 'limit') throw new Error('no limit');
  const { nominal: _nominal, ...limit } = clause.requirement;
  return { ...clause, requirement: { ...limit, max: inch('0.8420') } };
};
const TOTAL = LARGE.length + 1 + COPIES;

it('a bulletin is tried on what was found in every closed inspection, with the list', async () => {
  const tried = await previewBulletin(world.ports(), night.official, {
    seriesId: night.seriesId,
    classId: night.classId,
    content: bulletinOf(tight(), { kind: 'safety' }),
  });
  expect(tried?.found?.sentence).toBe(`This would fail 3 of ${TOTAL} engines.`);
  expect(tried?.found?.failed.map((one) => one.name).sort()).toEqual([
    'Car 12J, event 1',
    'Car 7, event 1',
    'Car 99, event 1',
  ]);
  for (const { results } of tried?.found?.failed ?? []) {
    expect(results).toMatchObject([{ clause: '4.2', pass: false, state: 'outside' }]);
    expect(results[0]?.perPosition.find((one) => one.pass === false)?.sentence).toContain(
      'mean 0.8425 in ± 0.00012 in; at most 0.8420 in: outside',
    );
  }
});

it('so is a draft of the next edition', async () => {
  const { clauses, penalties } = tappetContent();
  const tried = await tryEdition(world.ports(), night.official, {
    seriesId: night.seriesId,
    classId: night.classId,
    content: {
      clauses: clauses.map((one) => (one.number === '4.2' ? tight() : one)) as typeof clauses,
      penalties,
    },
  });
  expect([tried?.found.tried, tried?.found.failed.length]).toEqual([TOTAL, 3]);
});

it('reads the inspections together, however many there are', async () => {
  let asked = 0;
  const ports = world.ports();
  const { execute, find } = ports.db;
  Object.assign(ports.db, {
    execute: (...given: Parameters<typeof execute>) => {
      asked += 1;
      return execute.apply(ports.db, given);
    },
    find: (...given: Parameters<typeof find>) => {
      asked += 1;
      return find.apply(ports.db, given);
    },
  });
  await previewBulletin(ports, night.official, {
    seriesId: night.seriesId,
    classId: night.classId,
    content: bulletinOf(tight(), { kind: 'safety' }),
  });
  expect(asked).toBeGreaterThan(5);
  expect(asked).toBeLessThan(20);
});
