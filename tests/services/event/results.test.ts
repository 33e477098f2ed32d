import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { sha256, toHex, utf8 } from '@/domain/ledger/bytes';
import { enterCars } from '@/services/event/enter-cars';
import { findEventResults } from '@/services/event/results/find-event-results';
import { makeOfficial, takeBackResults } from '@/services/event/results/state-results';
import { writePositions } from '@/services/event/write-positions';
import { failureOf, get } from '../../support/bay';
import { BIG_FEET, BREACH } from '../../support/verdict-case';
import { openVerdictWorld, type VerdictWorld } from '../../support/verdict-world';
import { openWorld } from '../../support/world';

let v: VerdictWorld;
beforeAll(async () => {
  v = await openVerdictWorld(await openWorld());
});
afterAll(() => v.world.close());

const uuid = () => v.world.ports().random.uuid();
const results = async () => {
  const { classes, event } = get(await findEventResults(v.world.ports(), v.official, v.eventId));
  const [first] = classes;
  if (first === undefined) throw new Error('There is no class.');
  return { ...first, state: event.resultsState };
};
const at = async () => ({
  act: uuid(),
  seriesId: v.seriesId,
  eventId: v.eventId,
  classId: (await results()).classId,
});
const official = async (
  exceptions: readonly { entryId: string; reason: string }[] = [],
  by = v.official,
) => makeOfficial(v.world.ports(), by, { ...(await at()), exceptions });
const takeBack = async (reason: string) =>
  takeBackResults(v.world.ports(), v.official, { ...(await at()), reason });
const position = async (car: string, place: number | null) =>
  writePositions(v.world.ports(), v.official, {
    act: uuid(),
    seriesId: v.seriesId,
    eventId: v.eventId,
    positions: (await results()).lines
      .filter(({ carNumber }) => carNumber === car)
      .map(({ entryId }) => ({ entryId, position: place, state: 'entered' as const })),
  });

describe('results', () => {
  it('are unofficial until every picked car has its verdict or is named with a reason', async () => {
    const [a, b] = [await v.addInspection('12J'), await v.addInspection('8')];
    get(await position('8', 2));
    get(await position('12J', 1));
    expect((await results()).lines.map(({ carNumber, held }) => [carNumber, held])).toEqual([
      ['12J', true],
      ['8', true],
    ]);
    expect(failureOf(await official()).faults?.map(({ detail }) => detail)).toEqual([
      expect.stringContaining('Car 12J is held for inspection'),
      expect.stringContaining('Car 8 is held for inspection'),
    ]);
    await v.sign(a, BIG_FEET);
    get(await v.decide(a, BREACH));
    const after = await results();
    expect(after.lines[0]).toMatchObject({ decision: 'breach', held: false, position: 1 });
    expect(after.lines[0]?.penalty).not.toBe('');
    const held = after.lines[1]?.entryId ?? '';
    expect(failureOf(await official()).faults).toHaveLength(1);
    expect(failureOf(await official([{ entryId: held, reason: '  ' }])).faults).toHaveLength(1);
    get(await official([{ entryId: held, reason: 'Its engine is opened on Monday.' }]));
    expect(b).not.toBe(a);
  });

  it('stand in the ledger as they were stated, the breached car where it was written', async () => {
    const { statements, state, official: is } = await results();
    expect([is, state]).toEqual([true, 'official']);
    expect(statements).toHaveLength(1);
    expect(statements[0]).toMatchObject({
      number: 1,
      kind: 'official',
      exceptions: [{ car: '8', reason: 'Its engine is opened on Monday.' }],
    });
    const [line] = await v.world.ports().db.execute<{ content: string; open: boolean }[]>(
      `select c.content, c.open from record.ledger_content c join record.ledger_line l
           on l.series_id = c.series_id and l.index = c.line_index
         where l.kind = 'results-official' and c.role = 'results'`,
    );
    expect(line?.open).toBe(true);
    expect(toHex(sha256(utf8(line?.content ?? '')))).toBe(statements[0]?.hash);
    expect(JSON.parse(line?.content ?? '').cars).toEqual([
      expect.objectContaining({ car: '12J', position: '1', decision: 'breach' }),
      { car: '8', position: '2', scratched: 'no' },
    ]);
    expect(line?.content).not.toContain(v.official.name);
  });

  it('are not touched while official; taken back in public with a reason, they can be', async () => {
    const refused = failureOf(await position('8', 3));
    expect(refused.detail).toContain('are official. Take them back first');
    const { classId } = await results();
    const entry = {
      id: uuid(),
      classId,
      carNumber: '77',
      competitorName: 'Late Comer',
      engineReference: '',
      position: null,
    };
    const late = { act: uuid(), seriesId: v.seriesId, eventId: v.eventId, entries: [entry] };
    expect(failureOf(await enterCars(v.world.ports(), v.official, late)).name).toBe(
      'not-in-this-state',
    );
    expect(failureOf(await official()).name).toBe('not-in-this-state');
    expect(failureOf(await takeBack('')).name).toBe('invalid');
    get(await takeBack('A lap of car 8 was counted twice.'));
    expect((await results()).state).toBe('unofficial');
    expect(failureOf(await takeBack('Again')).name).toBe('not-in-this-state');
    get(await position('8', 3));
    const held = (await results()).lines.find(({ carNumber }) => carNumber === '8')?.entryId ?? '';
    get(await official([{ entryId: held, reason: 'Its engine is opened on Monday.' }]));
    expect((await results()).statements.map(({ number, kind }) => [number, kind])).toEqual([
      [1, 'official'],
      [2, 'taken-back'],
      [3, 'official'],
    ]);
  });

  it('are the officials’ alone, and a second press is the same act', async () => {
    expect(failureOf(await official([], v.inspector)).name).toBe('absent');
    expect(failureOf(await findEventResults(v.world.ports(), v.inspector, v.eventId)).name).toBe(
      'absent',
    );
    const once = { ...(await at()), reason: 'Twice' };
    const both = await Promise.all([
      takeBackResults(v.world.ports(), v.official, once),
      takeBackResults(v.world.ports(), v.official, once),
    ]);
    expect(both).toEqual([
      { ok: true, value: { number: 4 } },
      { ok: true, value: { number: 4 } },
    ]);
  });
});
