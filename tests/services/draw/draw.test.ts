import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { readDrawCommitment, readDrawMade, readDrawVoid } from '@/domain/draw/documents';
import { verifyDraw } from '@/domain/draw/verify-draw';
import { verifyDrawLines } from '@/domain/draw/verify-draw-lines';
import { verifyVoid } from '@/domain/draw/verify-void';
import { sha256, toHex, utf8 } from '@/domain/ledger/bytes';
import { conclude } from '@/domain/ledger/verify/step';
import { announceDraw } from '@/services/draw/announce-draw';
import { findClassDraw } from '@/services/draw/find-class-draw';
import { findPublicDraw, listPublicDraws } from '@/services/draw/find-public-draw';
import { pickDrawn } from '@/services/draw/pick-drawn';
import { publishDraw } from '@/services/draw/publish-draw';
import { voidDraw } from '@/services/draw/void-draw';
import { enterCars } from '@/services/event/enter-cars';
import { pickCars } from '@/services/event/pick-cars';
import { writePositions } from '@/services/event/write-positions';
import { addClass } from '@/services/series/add-class';
import { connect } from '../../../scripts/postgres/roles.mjs';
import { failureOf, get, openRaceNight, type RaceNight } from '../../support/bay';
import { runPrintedScript } from '../../support/draw';
import { openRecordWorld, type RecordWorld, signNow } from '../../support/record';
import { addActor, addSeries } from '../../support/world';

const SESSION = '2026-07-11T23:30:00.000Z';
const BEFORE = '2026-07-11T21:00:00.000Z';
const AFTER = '2026-07-12T03:30:00.000Z';
const CARS = ['21', '12J', '7', '33', '90X', '12', '64', '58'];

let world: RecordWorld;
let night: RaceNight;
beforeAll(async () => {
  world = await openRecordWorld();
  night = await openRaceNight(world);
});
afterAll(() => world.close());

const ports = () => world.ports();
const uuid = () => ports().random.uuid();

/** A class of its own, with cars entered, so that no test sees another's draw. */
const openClass = async (name: string, cars: readonly string[] = CARS) => {
  const { seriesId, seasonId, official } = night;
  const classId = name === 'Street Stock' ? night.classId : uuid();
  if (classId !== night.classId)
    get(await addClass(ports(), official, { act: uuid(), seriesId, id: classId, seasonId, name }));
  await enter(classId, cars);
  return classId;
};
const enter = async (classId: string, cars: readonly string[]) => {
  const { seriesId, eventId, official } = night;
  const entries = cars.map((carNumber) => ({
    id: uuid(),
    classId,
    carNumber,
    competitorName: `Competitor ${carNumber}`,
    engineReference: '',
    position: null,
  }));
  get(await enterCars(ports(), official, { act: uuid(), seriesId, eventId, entries }));
  return entries;
};
const withdraw = async (entryId: string) => {
  const { seriesId, eventId, official } = night;
  const positions = [{ entryId, position: null, state: 'withdrawn' as const }];
  get(await writePositions(ports(), official, { act: uuid(), seriesId, eventId, positions }));
};
const look = async (classId: string) => {
  const found = await findClassDraw(ports(), night.official, { eventId: night.eventId, classId });
  if (found === undefined) throw new Error('There is no such class.');
  return found;
};
const VALUES = [
  {
    name: 'Two dice, thrown three times by a competitor at the drivers’ meeting: each sum',
    ifMissing: 'void' as const,
    substitute: '',
  },
  {
    name: 'Laps completed by each car of the feature',
    ifMissing: 'substitute' as const,
    substitute: 'Cars that took the green flag',
  },
  { name: 'Laps under caution', ifMissing: 'left-out' as const, substitute: '' },
];
const request = async (classId: string, more = {}) => ({
  act: uuid(),
  seriesId: night.seriesId,
  id: uuid(),
  eventId: night.eventId,
  classId,
  poolHash: (await look(classId)).now.hash,
  select: 2,
  sessionAt: SESSION,
  values: VALUES,
  ...more,
});
const announce = async (classId: string, more = {}, actor = night.official) =>
  announceDraw(ports(), actor, await request(classId, more));
const ENTERED = [
  { name: VALUES[0]?.name ?? '', source: 'announced' as const, numbers: ['7', '11', '4'] },
  { name: VALUES[1]?.name ?? '', source: 'substitute' as const, numbers: ['8'] },
  { name: VALUES[2]?.name ?? '', source: 'missing' as const, numbers: [] as string[] },
];
const make = (drawId: string, more = {}, actor = night.official) =>
  publishDraw(ports(), actor, {
    act: uuid(),
    seriesId: night.seriesId,
    drawId,
    values: ENTERED,
    ...more,
  });
const end = (drawId: string, more = {}, actor = night.official) =>
  voidDraw(ports(), actor, {
    act: uuid(),
    seriesId: night.seriesId,
    drawId,
    reason: 'Rain: the feature was not run.',
    ...more,
  });
const pick = (drawId: string, more = {}, actor = night.official) =>
  pickDrawn(ports(), actor, {
    act: uuid(),
    seriesId: night.seriesId,
    drawId,
    inspectionIds: [uuid(), uuid()],
    ...more,
  });
const published = async (drawId: string) => {
  const found = await findPublicDraw(ports(), { seriesId: night.seriesId, drawId });
  if (found === undefined) throw new Error('There is no such draw.');
  return found;
};
const linesOf = (drawId: string) =>
  ports().db.execute<{ kind: string; line: string }[]>(
    `select kind, line from record.ledger_line
     where series_id = ? and line::jsonb -> 'refs' ->> 'draw' = ? order by index`,
    [night.seriesId, drawId],
  );

describe('a draw from beginning to end', () => {
  let drawId: string;
  let classId: string;

  it('is announced with a numbered pool of the cars entered, withdrawn ones left out', async () => {
    world.clock.set(BEFORE);
    classId = await openClass('Street Stock');
    const [gone] = await enter(classId, ['99']);
    await withdraw(gone?.id ?? '');
    const announced = get(await announce(classId));
    drawId = announced.id;
    const commitment = get(readDrawCommitment(announced.document));
    expect(commitment.pool.map(({ number, car }) => `${number}:${car}`)).toEqual([
      '1:7',
      '2:12',
      '3:12J',
      '4:21',
      '5:33',
      '6:58',
      '7:64',
      '8:90X',
    ]);
    expect(commitment).toMatchObject({ subject: 'Street Stock', select: '2', follows: '' });
    expect(await linesOf(drawId)).toMatchObject([{ kind: 'draw-committed' }]);
  });

  it('shows its announcement and nothing of the secret before it is made', async () => {
    const found = await published(drawId);
    expect(found.end).toBeNull();
    expect(found.announced.document).not.toContain('"secret":');
    const app = await connect(world.database.appUrl);
    const superuser = await connect(world.database.superuserUrl);
    try {
      const { rows } = await superuser.query<{ secret: Buffer }>(
        'select secret from sealed.draw_secret where draw_id = $1',
        [drawId],
      );
      const secret = rows[0]?.secret.toString('hex') ?? '';
      expect(secret).toMatch(/^[0-9a-f]{64}$/);
      await expect(app.query('select * from sealed.draw_secret')).rejects.toMatchObject({
        code: '42501',
      });
      // Nowhere else in the database either: every readable table is searched for it.
      const { rows: tables } = await superuser.query<{ name: string }>(
        `select format('%I.%I', schemaname, tablename) as name from pg_tables
         where schemaname in ('public', 'record', 'jobs')`,
      );
      expect(tables.length).toBeGreaterThan(30);
      const tablesWith = async (text: string) => {
        const found: string[] = [];
        for (const { name } of tables) {
          const { rows: hits } = await superuser.query(
            `select 1 from ${name} t where t::text like '%' || $1 || '%' limit 1`,
            [text],
          );
          if (hits.length > 0) found.push(name);
        }
        return found;
      };
      expect(await tablesWith(secret)).toEqual([]);
      // The same search finds what is published.
      const { secretHash } = get(readDrawCommitment(found.announced.document));
      expect(await tablesWith(secretHash)).toEqual(
        expect.arrayContaining(['record.act', 'record.draw', 'record.ledger_content']),
      );
    } finally {
      await app.end();
      await superuser.end();
    }
  });

  it('refuses a look under the cover: what is opened must end the draw', async () => {
    const app = await connect(world.database.appUrl);
    try {
      await expect(
        app.query('select append.open_draw_secret($1, $2)', [night.seriesId, drawId]),
      ).rejects.toMatchObject({ code: '42501' });
    } finally {
      await app.end();
    }
  });

  it('keeps its pool: entries later and withdrawals change nothing, a second announcement is refused', async () => {
    await enter(classId, ['44']);
    const again = failureOf(await announce(classId));
    expect(again.name).toBe('not-in-this-state');
    const [shown] = await listPublicDraws(ports(), { seriesId: night.seriesId, event: 'july' });
    expect(shown?.enteredLater).toEqual(['44']);
    expect(get(readDrawCommitment((await published(drawId)).announced.document)).pool.length).toBe(
      8,
    );
  });

  it('is not made before its session begins, whoever asks', async () => {
    world.clock.set('2026-07-11T23:29:59.999Z');
    const early = failureOf(await make(drawId));
    expect([early.name, early.detail]).toEqual([
      'not-in-this-state',
      expect.stringContaining('The session has not begun'),
    ]);
    expect((await published(drawId)).end).toBeNull();
  });

  it('names each value at fault and keeps the secret covered', async () => {
    world.clock.set(AFTER);
    const values = [
      { ...ENTERED[0], source: 'missing' as const, numbers: [] },
      { ...ENTERED[1], numbers: [] },
      { ...ENTERED[2], source: 'substitute' as const, numbers: ['3'] },
    ];
    const faults = failureOf(await make(drawId, { values })).faults ?? [];
    expect(faults.map(({ pointer }) => pointer)).toEqual([
      '/values/0/numbers',
      '/values/1/numbers',
      '/values/2/numbers',
    ]);
    expect(faults[0]?.detail).toContain('Declare it void');
    expect(failureOf(await make(drawId, { values: ENTERED.slice(0, 2) })).name).toBe('invalid');
    expect((await published(drawId)).end).toBeNull();
  });

  it('is made once by two officials at once, and the same act again gives the same answer', async () => {
    const { seriesId } = night;
    const second = await addActor(world, 'Bram Askwith', [{ seriesId, role: 'official' }]);
    const act = uuid();
    const [one, other] = await Promise.all([make(drawId, { act }), make(drawId, {}, second)]);
    expect([one.ok, other.ok].filter(Boolean)).toHaveLength(1);
    const refused = one.ok ? other : one;
    expect(failureOf(refused).detail).toContain('It is made once');
    expect(failureOf(refused).detail).toContain(
      `It was made by ${one.ok ? night.official.name : second.name}, `,
    );
    if (one.ok) expect(get(await make(drawId, { act }))).toEqual(one.value);
    expect(failureOf(await make(drawId)).name).toBe('not-in-this-state');
    expect((await linesOf(drawId)).map(({ kind }) => kind)).toEqual([
      'draw-committed',
      'draw-made',
    ]);
  });

  it('cannot be declared void once made', async () => {
    expect(failureOf(await end(drawId)).detail).toContain('made once and stands');
  });

  it('verifies from what is published alone: documents, lines, signed head', async () => {
    await signNow(ports(), night.seriesId);
    const { announced, end: made } = await published(drawId);
    if (made === null) throw new Error('It was made.');
    const run = verifyDraw({ commitment: announced.document, made: made.document });
    expect(conclude(run.steps)).toBe('passed');
    if (announced.proof === null || made.proof === null) throw new Error('A head was signed.');
    const lines = verifyDrawLines(
      { ...announced, proof: announced.proof },
      { ...made, proof: made.proof },
      [world.keys.signer(night.seriesId).key],
    );
    expect(lines.filter(({ outcome }) => outcome !== 'passed')).toEqual([]);
  });

  it('verifies with the script printed in the record’s format, and a changed result does not', async () => {
    const { announced, end: made } = await published(drawId);
    const { selected } = get(readDrawMade(made?.document ?? ''));
    const cars = selected.map(({ car }) => car);
    expect(runPrintedScript(announced.document, made?.document ?? '')).toEqual({
      says: `same: ${cars.join(', ')}`,
      code: 0,
    });
    const other = CARS.find((car) => !cars.includes(car)) ?? '';
    const forged = (made?.document ?? '').replace(`"car":"${cars[0]}"`, `"car":"${other}"`);
    expect(runPrintedScript(announced.document, forged).code).toBe(1);
  });

  it('opens an inspection for each drawn car, once, and passes over one that is picked already', async () => {
    const { seriesId, eventId, official } = night;
    const { selected } = get(readDrawMade((await published(drawId)).end?.document ?? ''));
    const [first, second] = selected.map(({ car }) => car);
    const [entry] = await ports().db.execute<{ id: string }[]>(
      'select id from public.entry where event_id = ? and class_id = ? and car_number = ?',
      [eventId, classId, first],
    );
    const winner = {
      inspectionId: uuid(),
      entryId: entry?.id ?? '',
      because: 'position' as const,
      words: '',
    };
    get(await pickCars(ports(), official, { act: uuid(), seriesId, eventId, picks: [winner] }));
    const act = uuid();
    const inspectionIds = [uuid(), uuid()];
    const expected = [
      { car: first, state: 'picked-before', inspectionId: winner.inspectionId },
      { car: second, state: 'picked', inspectionId: inspectionIds[1] },
    ];
    expect(get(await pick(drawId, { act, inspectionIds })).cars).toEqual(expected);
    expect(get(await pick(drawId, { act, inspectionIds })).cars).toEqual(expected);
    expect(get(await pick(drawId)).cars).toEqual(expected);
    const [row] = await ports().db.execute<{ because: string; words: string }[]>(
      'select picked_because as because, picked_words as words from public.inspection where id = ?',
      [inspectionIds[1]],
    );
    expect(row).toEqual({ because: 'drawn', words: 'Drawn, place 2' });
  });
});

describe('announcing', () => {
  it('refuses a session that has begun, more cars than there are, values that cannot be', async () => {
    world.clock.set(BEFORE);
    const classId = await openClass('Hobby');
    const at = async (more: object) => {
      const { name, faults } = failureOf(await announce(classId, more));
      return [name, faults?.[0]?.pointer];
    };
    expect(await at({ sessionAt: BEFORE })).toEqual(['invalid', '/sessionAt']);
    expect(await at({ select: 9 })).toEqual(['invalid', '/select']);
    expect(await at({ poolHash: '0'.repeat(64) })).toEqual(['stale', undefined]);
    expect(await at({ classId: uuid(), poolHash: '0'.repeat(64) })).toEqual(['absent', undefined]);
  });

  it('refuses a pool that changed after it was shown', async () => {
    const classId = await openClass('Pure Stock');
    const asked = await request(classId);
    await enter(classId, ['5']);
    expect(failureOf(await announceDraw(ports(), night.official, asked)).name).toBe('stale');
  });

  it('refuses a class without a car', async () => {
    const classId = await openClass('Mini', ['1']);
    const { id } = (await enter(classId, ['2']))[0] ?? { id: '' };
    await withdraw(id);
    expect((await look(classId)).now.pool).toEqual([{ number: '1', car: '1' }]);
    const [{ id: last } = { id: '' }] = await ports().db.execute<{ id: string }[]>(
      `select id from public.entry where class_id = ? and car_number = '1'`,
      [classId],
    );
    await withdraw(last);
    expect(failureOf(await announce(classId)).faults?.[0]?.pointer).toBe('/classId');
  });

  it('happens once when two officials announce at once, and the same act again is the same draw', async () => {
    const classId = await openClass('Late Model');
    const [one, other] = [await request(classId), await request(classId)];
    const both = await Promise.all(
      [one, other].map((asked) => announceDraw(ports(), night.official, asked)),
    );
    expect(both.filter(({ ok }) => ok)).toHaveLength(1);
    for (const refused of both.filter(({ ok }) => !ok))
      expect(failureOf(refused).detail).toContain(`It was announced by ${night.official.name}, `);
    const done = both[0]?.ok ? one : other;
    const again = get(await announceDraw(ports(), night.official, done));
    expect(again.id).toBe(done.id);
    expect(
      failureOf(await announceDraw(ports(), night.official, { ...done, select: 3 })).name,
    ).toBe('same-id-other-content');
    const lines = await linesOf(done.id);
    expect(lines).toHaveLength(1);
  });
});

describe('a void draw', () => {
  it('is public with its reason and its secret, and the next draw names it', async () => {
    world.clock.set(BEFORE);
    const classId = await openClass('Sportsman');
    const first = get(await announce(classId)).id;
    const ended = get(await end(first)).document;
    const { announced, end: shown } = await published(first);
    expect(shown).toMatchObject({ kind: 'void', document: ended });
    expect(conclude(verifyVoid({ commitment: announced.document, ended }))).toBe('passed');
    expect(get(readDrawVoid(ended)).reason).toBe('Rain: the feature was not run.');
    expect(failureOf(await make(first)).detail).toContain('declared void');
    expect(failureOf(await end(first)).name).toBe('not-in-this-state');
    const second = get(await announce(classId));
    expect(get(readDrawCommitment(second.document)).follows).toBe(toHex(sha256(utf8(ended))));
    expect((await linesOf(first)).map(({ kind }) => kind)).toEqual(['draw-committed', 'draw-void']);
    world.clock.set(AFTER);
    get(await make(second.id));
    const { announced: commitment, end: made } = await published(second.id);
    expect(runPrintedScript(commitment.document, made?.document ?? '').code).toBe(0);
  });

  it('and making it at the same time: one of the two', async () => {
    world.clock.set(BEFORE);
    const classId = await openClass('Thunder');
    const { id } = get(await announce(classId));
    world.clock.set(AFTER);
    const both = await Promise.all([make(id), end(id)]);
    expect(both.filter(({ ok }) => ok)).toHaveLength(1);
    expect(await linesOf(id)).toHaveLength(2);
  });
});

describe('a drawn car that withdrew', () => {
  it('gets no inspection, and nobody is drawn in its place', async () => {
    world.clock.set(BEFORE);
    const classId = await openClass('Street Stock B', ['70', '71']);
    const { id } = get(await announce(classId));
    const [{ id: entryId } = { id: '' }] = await ports().db.execute<{ id: string }[]>(
      `select id from public.entry where class_id = ? and car_number = '70'`,
      [classId],
    );
    const rest = await ports().db.execute<{ id: string }[]>(
      `select id from public.entry where class_id = ? and car_number = '71'`,
      [classId],
    );
    await withdraw(entryId);
    await withdraw(rest[0]?.id ?? '');
    world.clock.set(AFTER);
    get(await make(id));
    const { cars } = get(await pick(id));
    expect(cars.map(({ state }) => state)).toEqual(['withdrawn', 'withdrawn']);
  });
});

describe('those without standing', () => {
  it('are told that there is nothing, whatever they ask', async () => {
    world.clock.set(BEFORE);
    const { seriesId } = night;
    const classId = await openClass('Open');
    const { id } = get(await announce(classId));
    const stranger = await addActor(world, 'Stranger');
    const other = await addSeries(world, 'elsewhere');
    const elsewhere = await addActor(world, 'Elsewhere', [{ seriesId: other, role: 'official' }]);
    const panel = await addActor(world, 'Panel', [{ seriesId, role: 'panel' }]);
    world.clock.set(AFTER);
    for (const actor of [
      stranger,
      elsewhere,
      panel,
      night.chief,
      night.inspector,
      night.competitor,
    ]) {
      const answers = [
        await announce(classId, {}, actor),
        await make(id, {}, actor),
        await end(id, {}, actor),
        await pick(id, {}, actor),
      ];
      expect(answers.map((answer) => failureOf(answer).name)).toEqual(
        Array.from({ length: 4 }, () => 'absent'),
      );
      expect(
        await findClassDraw(ports(), actor, { eventId: night.eventId, classId }),
      ).toBeUndefined();
    }
    for (const unknown of [uuid(), 'nonsense'])
      for (const answer of [await make(unknown), await end(unknown), await pick(unknown)])
        expect(failureOf(answer).name).toBe('absent');
    expect(failureOf(await pick(id)).name).toBe('not-in-this-state');
  });
});
