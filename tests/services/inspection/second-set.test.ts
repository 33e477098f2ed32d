import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Actor } from '@/domain/access/permission';
import { assessFile } from '@/services/inspection/read/assess-file';
import {
  fileOf,
  get,
  openInspection,
  openRaceNight,
  type RaceNight,
  rowsFor,
  send,
} from '../../support/bay';
import { addActor, openWorld, type World } from '../../support/world';

let world: World;
let night: RaceNight;
let other: Actor;
beforeAll(async () => {
  world = await openWorld();
  night = await openRaceNight(world);
  other = await addActor(world, 'Wim Aldergate', [{ seriesId: night.seriesId, role: 'inspector' }]);
});
afterAll(() => world.close());

const NEW_ZERO = 'An independent second set needs a zero of its own, taken after the first set.';
const uuid = () => world.ports().random.uuid();

/** One reading of a second set of bore 1 exhaust, on a run. */
const secondReading = (rows: ReturnType<typeof rowsFor>, zeroRunId?: string) =>
  rows.reading({
    quantity: 'tappet-bore-diameter',
    depth: 'above',
    method: 'comparative',
    gaugeId: night.dial,
    set: 2,
    value: { text: '0.1', unit: 'thou' },
    ...(zeroRunId === undefined ? {} : { zeroRunId }),
  });

const standings = async (id: string) =>
  new Map(
    (await fileOf(world, night.chief, id)).rows.readings.map((row) => [
      row.id,
      [row.standing, row.note] as const,
    ]),
  );

describe('an independent second set', () => {
  it('is kept and does not count without a zero of its own, taken after the first set', async () => {
    const id = await openInspection(world, night, '31');
    const rows = rowsFor(world, night);
    const first = rows.fullBore();
    get(await send(world, night.inspector, id, first));
    const firstRun = first.find((row) => row.kind === 'zero')?.runId;
    const onFirst = secondReading(rows, firstRun);
    const onNothing = secondReading(rows);
    const answer = get(await send(world, night.inspector, id, [onFirst, onNothing]));
    expect(answer.received).toEqual(
      [onFirst, onNothing].map((row) => ({ id: row.id, reason: NEW_ZERO })),
    );
    const run = uuid();
    const good = secondReading(rows, run);
    const taken = [
      rows.zero(run, 'opening', '0.0'),
      { ...good, occurredAt: rows.reading({}).occurredAt },
    ];
    expect(get(await send(world, night.inspector, id, taken)).received).toEqual([]);
    const kept = await standings(id);
    expect(kept.get(onFirst.id)).toEqual(['received', NEW_ZERO]);
    expect(kept.get(good.id)?.[0]).toBe('accepted');
    const bore = assessFile(await fileOf(world, night.chief, id)).bores.find(
      ({ key }) => key === '1 exhaust',
    );
    expect(bore?.sets.map(({ set }) => [set.set, set.runId])).toEqual([
      [1, firstRun],
      [2, run],
    ]);
    expect(bore?.secondSets[0]?.alone).toBe(true);
  });

  it('counts by an inspector who was not named for the car, and nothing else of theirs does', async () => {
    const id = await openInspection(world, night, '32');
    const rows = rowsFor(world, night);
    get(await send(world, night.inspector, id, rows.fullBore()));
    const run = uuid();
    const [opening, closing] = [rows.zero(run, 'opening', '0.0'), rows.zero(run, 'closing', '0.0')];
    const good = { ...secondReading(rows, run), occurredAt: closing.occurredAt };
    const astray = rows.reading({});
    const answer = get(await send(world, other, id, [opening, good, closing, astray]));
    expect(answer.received).toEqual([
      { id: astray.id, reason: 'Wim Aldergate was not the inspector named for this car.' },
    ]);
    const bore = assessFile(await fileOf(world, night.chief, id)).bores.find(
      ({ key }) => key === '1 exhaust',
    );
    expect(bore?.secondSets[0]).toMatchObject({
      alone: false,
      firstBy: [night.inspector.personId],
      secondBy: [other.personId],
    });
  });

  it('of a strike by another inspector only one of their own second set goes through', async () => {
    const id = await openInspection(world, night, '33');
    const rows = rowsFor(world, night);
    const first = rows.fullBore();
    get(await send(world, night.inspector, id, first));
    const theirs = first.find((row) => row.kind === 'reading');
    const run = uuid();
    const opening = rows.zero(run, 'opening', '0.0');
    const own = { ...secondReading(rows, run), occurredAt: rows.reading({}).occurredAt };
    get(await send(world, other, id, [opening, own]));
    const strikes = [rows.strike(own.id), rows.strike(theirs?.id ?? '')];
    const answer = get(await send(world, other, id, strikes));
    expect(answer.received.map((row) => row.id)).toEqual([strikes[1]?.id]);
  });
});

describe('lifters and reference parts', () => {
  it('come back as they were said: out, in, signed for; a reference part is no part of the engine', async () => {
    const id = await openInspection(world, night, '34');
    const { reading } = rowsFor(world, night);
    const remark = (more: object) => ({
      kind: 'remark' as const,
      id: uuid(),
      occurredAt: '2026-07-12T03:20:00.000Z',
      place: { bank: 'left', cylinder: '1', valve: 'exhaust' as const },
      reason: '',
      ...more,
    });
    const rows = [
      remark({ remark: 'lifter-out' }),
      remark({ remark: 'lifter-in', subject: '1 exhaust' }),
      remark({ remark: 'lifters-returned', subject: 'Fenn Ostrava', value: 'kept' }),
      remark({ remark: 'second-set', value: 'pooled', reason: 'They agree.' }),
      reading({ referencePart: 'R1', place: { bank: '', cylinder: '', valve: '' } }),
    ] as Parameters<typeof send>[3];
    get(await send(world, night.inspector, id, rows));
    const file = await fileOf(world, night.chief, id);
    expect(file.rows.remarks.map(({ kind, subject, answer }) => [kind, subject, answer])).toEqual(
      expect.arrayContaining([
        ['lifter-out', '', {}],
        ['lifter-in', '1 exhaust', {}],
        ['lifters-returned', 'Fenn Ostrava', { value: 'kept' }],
        ['second-set', '', { value: 'pooled' }],
      ]),
    );
    expect(file.rows.readings[0]?.referencePart).toBe('R1');
    const { facts } = assessFile(file);
    expect(facts.references.map(({ part }) => part)).toEqual(['R1']);
    expect(facts.numbers).toEqual([]);
  });
});
