import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Actor } from '@/domain/access/permission';
import { ENGINE_RULE_SET } from '@/domain/rulebook/rule-sets/engine';
import { WEIGHTS_RULE_SET } from '@/domain/rulebook/rule-sets/weights';
import { findChecks } from '@/services/event/check/find-checks';
import { readClearances } from '@/services/event/check/read-clearances';
import { recordCheck } from '@/services/event/check/record-check';
import { signChecks } from '@/services/event/check/sign-checks';
import { enterCars } from '@/services/event/enter-cars';
import { saveGauge } from '@/services/gauge/save-gauge';
import { auditLedger } from '@/services/ledger/audit/audit-ledger';
import { openDraft } from '@/services/rulebook/open-draft';
import { publishEdition } from '@/services/rulebook/publish-edition';
import { addClass } from '@/services/series/add-class';
import { failureOf, get, openRaceNight, type RaceNight } from '../../support/bay';
import { openWorld, type World } from '../../support/world';

let world: World;
let night: RaceNight;
let classId: string;
let scale: string;
let overdue: string;

const uuid = () => world.ports().random.uuid();

const addScale = async (code: string, dueOn: string) => {
  const id = uuid();
  const pounds = (text: string) => ({ text, unit: 'lb' });
  const description = {
    kind: 'scale',
    name: 'Platform scale',
    division: pounds('1'),
    calibratedOn: '2026-01-02',
    dueOn,
  } as const;
  const gauge = { id, code, description, status: 'in-use', version: 0 } as const;
  get(
    await saveGauge(world.ports(), night.chief, {
      act: uuid(),
      seriesId: night.seriesId,
      ...gauge,
    }),
  );
  return id;
};

beforeAll(async () => {
  world = await openWorld();
  night = await openRaceNight(world);
  world.clock.set('2026-07-11T20:00:00.000Z');
  const { seriesId, seasonId, official } = night;
  classId = uuid();
  get(
    await addClass(world.ports(), official, {
      act: uuid(),
      seriesId,
      id: classId,
      seasonId,
      name: 'Late Light',
    }),
  );
  const car = WEIGHTS_RULE_SET.clauses.filter(({ number }) => number === '2');
  const engine = ENGINE_RULE_SET.clauses.filter(({ number }) => ['4', '4.1', '5'].includes(number));
  const content = { clauses: [...car, ...engine], penalties: WEIGHTS_RULE_SET.penalties };
  const draft = {
    id: uuid(),
    classId,
    title: 'First edition',
    content: content as unknown as Parameters<typeof openDraft>[2]['content'],
  };
  get(await openDraft(world.ports(), official, { act: uuid(), seriesId, ...draft }));
  get(
    await publishEdition(world.ports(), official, {
      act: uuid(),
      seriesId,
      draftId: draft.id,
      version: 1,
      inForceAt: null,
    }),
  );
  world.clock.set('2026-07-12T03:30:00.000Z');
  scale = await addScale('SC-01', '2027-01-02');
  overdue = await addScale('SC-02', '2026-02-02');
});
afterAll(() => world.close());

const at = () => ({ seriesId: night.seriesId, eventId: night.eventId });
const enter = async (carNumber: string, more = {}) => {
  const id = uuid();
  const row = {
    id,
    classId,
    carNumber,
    competitorName: `Competitor ${carNumber}`,
    engineReference: '',
    position: null,
    ...more,
  };
  get(await enterCars(world.ports(), night.official, { act: uuid(), ...at(), entries: [row] }));
  return id;
};
interface Said {
  readonly answer?: string;
  readonly value?: { readonly text: string; readonly unit: string };
  readonly gaugeId?: string;
  readonly takeBack?: string;
}
const check = (entryId: string, clause: string, said: Said, by: Actor = night.inspector) =>
  recordCheck(world.ports(), by, { act: uuid(), id: uuid(), ...at(), entryId, clause, ...said });
const weigh = (entryId: string, text: string, gaugeId = scale) =>
  check(entryId, '2', { value: { text, unit: 'lb' }, gaugeId });
const shown = async () =>
  get(await findChecks(world.ports(), night.inspector, night.eventId)).shown;
const fresh = (actor: Actor): Actor => ({
  ...actor,
  authenticatedAt: world.clock.now().toISOString(),
});
const sign = (mark: string, by = fresh(night.inspector)) =>
  signChecks(world.ports(), by, { act: uuid(), ...at(), mark });

describe('checks without teardown', () => {
  it('are the clauses that a whole car can be held against: scales, seals, plug gauge', async () => {
    await enter('1');
    const { checks } = await shown();
    expect(checks.map(({ clause, ask }) => [clause, ask.kind])).toEqual([
      ['2', 'value'],
      ['4.1', 'answer'],
      ['5', 'answer'],
    ]);
  });

  it('are judged by the rules in force: a value equal to the limit passes, one below does not', async () => {
    const [a, b] = [await enter('2'), await enter('3')];
    expect(get(await weigh(a, '2800'))).toMatchObject({ state: 'within', inspection: null });
    const failed = get(await weigh(b, '2799'));
    expect(failed.state).toBe('outside');
    expect(failed.inspection).not.toBeNull();
    const [opened] = await world
      .ports()
      .db.execute<{ because: string; words: string; state: string }[]>(
        'select picked_because as because, picked_words as words, state from public.inspection where id = ?',
        [failed.inspection],
      );
    expect(opened).toMatchObject({ because: 'failed-check', state: 'to-do' });
    expect(opened?.words).toMatch(/^Clause 2\. .*2799 lb/);
    expect(get(await weigh(b, '2798')).inspection).toBe(failed.inspection);
  });

  it('answer a seal and a plug gauge with a tap, and refuse what is no answer', async () => {
    const id = await enter('4');
    expect(get(await check(id, '5', { answer: 'intact' })).state).toBe('within');
    expect(get(await check(id, '4.1', { answer: 'did-not-pass' })).state).toBe('within');
    expect(failureOf(await check(id, '5', { answer: 'fine' })).faults?.[0]?.pointer).toBe(
      '/answer',
    );
    expect(failureOf(await check(id, '2', { answer: 'intact' })).faults?.[0]?.pointer).toBe(
      '/value',
    );
    expect(failureOf(await weigh(id, 'heavy')).faults?.[0]?.pointer).toBe('/value');
    expect(failureOf(await weigh(id, '2800', night.competitor.personId)).faults?.[0]?.pointer).toBe(
      '/gaugeId',
    );
    expect(failureOf(await check(id, '9', { answer: 'intact' })).faults?.[0]?.pointer).toBe(
      '/clause',
    );
  });

  it('make no statement on a scale out of calibration: the reading is kept and opens nothing', async () => {
    const id = await enter('5');
    const judged = get(await weigh(id, '2700', overdue));
    expect(judged).toMatchObject({ state: 'no-statement', inspection: null });
    expect(judged.sentence).toContain('overdue');
    const kept = (await shown()).checked.find(({ entryId }) => entryId === id);
    expect(kept?.value).toEqual({ text: '2700', unit: 'lb' });
  });

  it('are taken back with a reason, never erased', async () => {
    const id = await enter('6');
    get(await weigh(id, '28000'));
    expect(failureOf(await check(id, '2', { takeBack: '' })).name).toBe('invalid');
    get(await check(id, '2', { takeBack: 'A nought too many' }));
    expect((await shown()).checked.some(({ entryId }) => entryId === id)).toBe(false);
    const rows = await world
      .ports()
      .db.execute<{ state: string }[]>(
        'select state from record.event_check where entry_id = ? order by received_at',
        [id],
      );
    expect(rows.map(({ state }) => state)).toEqual(['within', 'taken-back']);
  });

  it('are recorded by inspectors without an interest in the car, by nobody else', async () => {
    const own = await enter('7');
    await world
      .ports()
      .db.execute('update public.entry set competitor_id = ? where id = ?', [
        night.inspector.personId,
        own,
      ]);
    expect(failureOf(await check(own, '5', { answer: 'intact' })).name).toBe(
      'conflict-of-interest',
    );
    for (const actor of [night.official, night.competitor])
      expect(failureOf(await check(own, '5', { answer: 'intact' }, actor)).name).toBe('absent');
    await world
      .ports()
      .db.execute(
        "update public.entry set competitor_id = null, state = 'withdrawn' where id = ?",
        [own],
      );
    expect(failureOf(await check(own, '5', { answer: 'intact' })).detail).toContain('scratched');
  });
});

describe('one page and one signature', () => {
  it('waits for every car to pass or to have its inspection, and names what is open', async () => {
    const refused = failureOf(await sign((await shown()).mark));
    expect(refused.faults?.map(({ detail }) => detail)).toEqual(
      expect.arrayContaining([
        'Car 1: clause 2 is not checked, or not passed, and it has no inspection.',
        'Car 5: clause 2 is not checked, or not passed, and it has no inspection.',
      ]),
    );
    expect(refused.faults?.some(({ detail }) => detail.startsWith('Car 3:'))).toBe(false);
  });

  it('needs a fresh sign-in, and the page as it was read', async () => {
    const { cars } = await shown();
    for (const { entryId, inspectionId } of cars) {
      if (inspectionId !== null) continue;
      get(await weigh(entryId, '2801'));
      get(await check(entryId, '5', { answer: 'intact' }));
      get(await check(entryId, '4.1', { answer: 'did-not-pass' }));
    }
    const { mark } = await shown();
    const stale = { ...night.inspector, authenticatedAt: '2026-07-12T01:00:00.000Z' };
    expect(failureOf(await sign(mark, stale)).name).toBe('fresh-sign-in-required');
    expect(failureOf(await sign('1')).name).toBe('stale');
    expect(failureOf(await sign(mark, fresh(night.official))).name).toBe('absent');
    get(await sign(mark));
  });

  it('is a signed document with a line: cars and clauses in public, values and names not', async () => {
    const [signed] = await readClearances(world.ports().db, at());
    expect(signed?.signer).toBe('Oona Brannick');
    const open = JSON.parse(signed?.cleared ?? '');
    expect(open.sheet).toBe(signed?.hash);
    expect(open.cars).toContainEqual({
      car: '3',
      className: 'Late Light',
      outcome: 'inspection',
      clauses: [],
    });
    expect(open.cars).toContainEqual({
      car: '2',
      className: 'Late Light',
      outcome: 'passed',
      clauses: ['2', '4.1', '5'],
    });
    expect(open.cars.map(({ car }: { car: string }) => car)).not.toContain('7');
    expect(signed?.cleared).not.toMatch(/2801|Brannick|Competitor/);
    const [row] = await world
      .ports()
      .db.execute<{ document: string }[]>('select document from record.event_clearance');
    expect(row?.document).toContain('2801');
    expect(row?.document).toContain('Oona Brannick');
  });

  it('leaves the record whole: every row is what its line commits to', async () => {
    const { faults } = await auditLedger(world.ports(), {
      seriesId: night.seriesId,
      heads: [],
      keys: [],
    });
    expect(faults).toEqual([]);
  });
});
