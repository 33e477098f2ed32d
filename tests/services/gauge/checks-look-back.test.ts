import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { WEIGHTS_RULE_SET } from '@/domain/rulebook/rule-sets/weights';
import { findChecks } from '@/services/event/check/find-checks';
import { recordCheck } from '@/services/event/check/record-check';
import { enterCars } from '@/services/event/enter-cars';
import { reportGaugeBad } from '@/services/gauge/report-gauge-bad';
import { findFault } from '@/services/gauge/review/find-fault';
import { previewLookBack } from '@/services/gauge/review/preview-look-back';
import { saveGauge } from '@/services/gauge/save-gauge';
import { auditLedger } from '@/services/ledger/audit/audit-ledger';
import { failureOf, get, openRaceNight, type RaceNight } from '../../support/bay';
import { openWorld, type World } from '../../support/world';

let world: World;
let night: RaceNight;
let wrong: string;
let right: string;

const uuid = () => world.ports().random.uuid();
const pounds = (text: string) => ({ text, unit: 'lb' });

const addScale = async (code: string, dueOn = '2027-01-02') => {
  const id = uuid();
  get(
    await saveGauge(world.ports(), night.chief, {
      act: uuid(),
      seriesId: night.seriesId,
      id,
      code,
      status: 'in-use',
      version: 0,
      description: {
        kind: 'scale',
        name: 'Platform scale',
        division: pounds('1'),
        calibratedOn: '2026-01-02',
        dueOn,
        certificate: { number: 'S-1', expandedUncertainty: pounds('1'), coverageFactor: '2' },
      },
    }),
  );
  return id;
};

beforeAll(async () => {
  world = await openWorld();
  const clauses = WEIGHTS_RULE_SET.clauses.filter(({ number }) => number === '2');
  night = await openRaceNight(world, 'scales', { clauses, penalties: WEIGHTS_RULE_SET.penalties });
  wrong = await addScale('SC-01');
  right = await addScale('SC-02');
});
afterAll(() => world.close());

const enter = async (carNumber: string) => {
  const id = uuid();
  const entry = {
    id,
    classId: night.classId,
    carNumber,
    competitorName: `Competitor ${carNumber}`,
    engineReference: '',
    position: null,
  };
  const { seriesId, eventId } = night;
  get(
    await enterCars(world.ports(), night.official, {
      act: uuid(),
      seriesId,
      eventId,
      entries: [entry],
    }),
  );
  return id;
};

const check = (entryId: string, said: Partial<Parameters<typeof recordCheck>[2]>) =>
  recordCheck(world.ports(), night.inspector, {
    act: uuid(),
    id: uuid(),
    seriesId: night.seriesId,
    eventId: night.eventId,
    entryId,
    clause: '2',
    ...said,
  });
const weigh = (entryId: string, text: string, gaugeId: string) =>
  check(entryId, { value: pounds(text), gaugeId });

const rowsOf = (entryId: string) =>
  world
    .ports()
    .db.execute<
      { value: string | null; gauge: string | null; state: string; reason: string; at: string }[]
    >(
      `select value_text as value, gauge_id as gauge, state, reason, taken_at::text as at
     from record.event_check where entry_id = ? order by received_at`,
      [entryId],
    );

describe('a scale wrongly chosen', () => {
  it('is corrected by a further row with the value and the time of the first, and the reason', async () => {
    const id = await enter('11');
    get(await weigh(id, '2810', wrong));
    world.clock.set('2026-07-12T03:45:00.000Z');
    const correction = 'Written down under the scale of the other lane';
    expect(get(await check(id, { correction, gaugeId: right })).state).toBe('within');
    const [first, second, ...more] = await rowsOf(id);
    expect(more).toEqual([]);
    expect(first).toMatchObject({ value: '2810', gauge: wrong, reason: '' });
    expect(second).toMatchObject({ value: '2810', gauge: right, reason: correction });
    expect(second?.at).toBe(first?.at);
    const { shown } = get(await findChecks(world.ports(), night.inspector, night.eventId));
    expect(shown.checked.filter(({ entryId }) => entryId === id)).toEqual([
      expect.objectContaining({ gauge: 'SC-02', correctedBecause: correction }),
    ]);
    const asked = { seriesId: night.seriesId, heads: [], keys: [] };
    expect((await auditLedger(world.ports(), asked)).faults).toEqual([]);
  });

  it('is judged anew: what an overdue scale left without a statement can fail', async () => {
    const overdue = await addScale('SC-03', '2026-02-02');
    const id = await enter('12');
    expect(get(await weigh(id, '2600', overdue))).toMatchObject({
      state: 'no-statement',
      inspection: null,
    });
    const judged = get(await check(id, { correction: 'Read on SC-02', gaugeId: right }));
    expect(judged.state).toBe('outside');
    expect(judged.inspection).not.toBeNull();
  });

  it('needs a reason, a reading that stands, and another gauge', async () => {
    const id = await enter('13');
    const correction = 'The other scale';
    const pointer = async (said: Parameters<typeof check>[1]) =>
      failureOf(await check(id, said)).faults?.[0]?.pointer;
    expect(await pointer({ correction, gaugeId: right })).toBe('/correction');
    get(await weigh(id, '2810', wrong));
    expect(await pointer({ correction: ' ', gaugeId: right })).toBe('/correction');
    expect(await pointer({ correction, gaugeId: wrong })).toBe('/gaugeId');
    expect(await pointer({ correction, gaugeId: uuid() })).toBe('/gaugeId');
    get(await check(id, { takeBack: 'Another car' }));
    expect(await pointer({ correction, gaugeId: right })).toBe('/correction');
    expect(await rowsOf(id)).toHaveLength(2);
  });
});

describe('the look-back of a scale found bad', () => {
  it('lists the checks without teardown that stand on it, and no other', async () => {
    const stands = await enter('21');
    const corrected = await enter('22');
    const takenBack = await enter('23');
    const elsewhere = await enter('24');
    const weighedAgain = await enter('25');
    for (const id of [stands, corrected, takenBack, weighedAgain])
      get(await weigh(id, '2820', wrong));
    get(await weigh(elsewhere, '2820', right));
    get(await check(corrected, { correction: 'It stood on SC-02', gaugeId: right }));
    get(await check(takenBack, { takeBack: 'Not this car' }));
    get(await weigh(weighedAgain, '2821', right));
    const { seriesId } = night;
    const seen = get(
      await previewLookBack(world.ports(), night.chief, { seriesId, gaugeId: wrong }),
    );
    const cars = ({ checks }: typeof seen.relied) => checks.map(({ carNumber }) => carNumber);
    expect(cars(seen.relied)).toEqual(['21']);
    const other = get(
      await previewLookBack(world.ports(), night.chief, { seriesId, gaugeId: right }),
    );
    expect(cars(other.relied)).toEqual(expect.arrayContaining(['11', '12', '22', '24', '25']));
    const id = uuid();
    get(
      await reportGaugeBad(world.ports(), night.chief, {
        act: uuid(),
        seriesId,
        id,
        gaugeId: wrong,
        foundAt: world.clock.now().toISOString(),
        off: null,
        reason: 'The corner pad had come loose.',
      }),
    );
    const fault = get(await findFault(world.ports(), night.official, { id }));
    expect(fault.lookBack.checks).toEqual([
      { carNumber: '21', clause: '2', event: 'July night', state: 'within' },
    ]);
  });
});
