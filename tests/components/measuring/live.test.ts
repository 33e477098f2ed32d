import { describe, expect, it } from 'vitest';
import { lastHeard, whoseFrom } from '@/components/measuring/live/heard';
import { newer } from '@/components/measuring/live/newer';
import { oneAtATime } from '@/components/measuring/live/one-at-a-time';
import { seenFrom } from '@/components/measuring/live/seen';
import { askedBy } from '@/components/measuring/sheet/flow/asked';
import { nextStep, type Standing } from '@/components/measuring/sheet/flow/steps';
import { partsOf } from '@/components/measuring/sheet/parts';
import { joinRows, type SheetRows } from '@/components/measuring/sheet/recorded';
import { readingRow, strikeRow } from '@/components/measuring/sheet/rows';
import { usualSetUp } from '@/components/measuring/sheet/set-up';
import type { Sheet, SheetGauge } from '@/components/measuring/sheet/sheet';
import { readSheetNow, type SheetNow } from '@/contracts/inspection/sheet';
import { judgeReadings, readingsThatCount } from '@/domain/inspection/capture/readings-that-count';
import type { ReadingRow } from '@/domain/inspection/capture/rows';
import { hideFirst } from '@/domain/inspection/second-set/hide-first';
import { positionsOf } from '@/domain/tappet/layout/bore-layout';
import { body, exhaust, GAUGES, intake, RULES, remark, TWIN } from '../../domain/inspection/build';

const NONE: SheetRows = { readings: [], zeros: [], remarks: [] };
const named = GAUGES.map((gauge): SheetGauge => ({ ...gauge, name: gauge.code }));

const sheetWith = (readings: readonly ReadingRow[], more: Partial<Sheet> = {}): Sheet => ({
  batch: 1,
  state: 'open',
  correcting: false,
  rows: { ...NONE, readings },
  gauges: named,
  people: { inspector: 'Oona Brannick', other: 'Marit Quell' },
  inspectionId: 'i',
  seriesId: 's',
  mark: undefined,
  personId: 'inspector',
  carNumber: '12J',
  engine: 'VR-1',
  engineId: null,
  competitor: 'Tamsin Overley',
  bay: '2',
  inspector: 'Oona Brannick',
  zone: 'America/Chicago',
  layout: TWIN,
  rules: RULES,
  paperwork: null,
  servedAt: '2026-07-16T02:00:00.000Z',
  ...more,
});

const nowOf = (sheet: Sheet, more: Partial<SheetNow>): SheetNow => ({
  batch: sheet.batch,
  state: sheet.state,
  correcting: sheet.correcting,
  rows: sheet.rows,
  gauges: sheet.gauges,
  people: sheet.people,
  ...more,
});

const theirs = (id: string, text: string, more: Partial<ReadingRow> = {}) =>
  body(id, text, { depth: 'upper', takenBy: 'other', ...more });

const [first] = positionsOf(TWIN);
if (first === undefined) throw new Error('no bores');
const parts = partsOf(RULES, 'full');
const [lifter] = parts;
if (lifter === undefined) throw new Error('no parts');
const setUp = { ...usualSetUp(named, '2026-07-16'), form: 'full' as const };

const mine = (text: string, cell = 'upper/along') =>
  readingRow({
    gauge: named[0] as SheetGauge,
    setUp,
    gauges: named,
    value: { text, unit: 'in' },
    part: lifter,
    position: first,
    cell,
    repeat: 1,
    set: 1,
    runId: undefined,
  });

const countingIn = ({ readings, remarks }: SheetRows) =>
  readingsThatCount(readings, remarks).map(({ row }) => row.value.text);

describe('what another tablet recorded joins the sheet', () => {
  it('with everybody’s rows, each once, own ones that are still waiting included', () => {
    const own = mine('0.8421');
    const sheet = sheetWith([theirs('b1', '0.8422')]);
    const after = newer(
      sheet,
      nowOf(sheet, {
        batch: 2,
        rows: { ...NONE, readings: [theirs('b1', '0.8422'), theirs('b2', '0.8423')] },
      }),
    );
    const rows = joinRows(after.rows, [own], 'inspector', 0);
    expect(countingIn(rows).sort()).toEqual(['0.8421', '0.8422', '0.8423']);
  });

  it('and an own batch that comes back from the server is not counted twice', () => {
    const own = mine('0.8421');
    const sheet = sheetWith([]);
    const [kept] = joinRows(NONE, [own], 'inspector', 0).readings;
    if (kept === undefined) throw new Error('no row');
    const after = newer(sheet, nowOf(sheet, { batch: 2, rows: { ...NONE, readings: [kept] } }));
    const rows = joinRows(after.rows, [own, mine('0.8424', 'upper/across')], 'inspector', 0);
    expect(countingIn(rows)).toEqual(['0.8421', '0.8424']);
  });

  it('an answer that was overtaken on its way brings no struck reading back', () => {
    const reading = theirs('b1', '0.8422');
    const struck = remark('c2', 'strike', { readingId: 'b1', reason: 'wrong-value' });
    const sheet = sheetWith([reading], {
      batch: 5,
      rows: { ...NONE, readings: [reading], remarks: [struck] },
    });
    const late = nowOf(sheet, { batch: 4, rows: { ...NONE, readings: [reading] } });
    expect(newer(sheet, late)).toBe(sheet);
    expect(countingIn(newer(sheet, late).rows)).toEqual([]);
  });

  it('an own strike that waits holds against what the server still has', () => {
    const reading = theirs('b1', '0.8422');
    const sheet = sheetWith([reading]);
    const after = newer(sheet, nowOf(sheet, { batch: 9 }));
    const rows = joinRows(after.rows, [strikeRow('b1', intake, 'wrong-value')], 'inspector', 0);
    expect(countingIn(rows)).toEqual([]);
  });

  it('nothing is drawn anew where nothing is new; a state or a gauge is', () => {
    const sheet = sheetWith([]);
    expect(newer(sheet, nowOf(sheet, {}))).toBe(sheet);
    expect(newer(sheet, nowOf(sheet, { state: 'closed' })).state).toBe('closed');
    expect(newer(sheet, nowOf(sheet, { gauges: [] })).gauges).toEqual([]);
  });

  it('an answer that is no sheet is none', () => {
    expect(readSheetNow({ title: 'Sign in' })).toBeUndefined();
    expect(readSheetNow(nowOf(sheetWith([]), {}))).toMatchObject({ batch: 1, state: 'open' });
  });
});

describe('a number that is being typed', () => {
  const standing = (readings: readonly ReadingRow[], cell: string | undefined): Standing => ({
    part: lifter,
    parts,
    cursor: { bore: 'any', part: lifter.key, set: 1, cell },
    setUp,
    positions: positionsOf(TWIN),
    position: first,
    judged: judgeReadings(readings, []),
    outOfReach: new Set(),
    asked: askedBy(setUp, []),
    second: [],
  });
  const there = { bank: first.bank, cylinder: String(first.cylinder), valve: first.valve };

  it('stays at the cell it was begun for, though another tablet fills that cell', () => {
    const theirReading = theirs('b1', '0.8422', { place: there });
    expect(nextStep(standing([], undefined))).toEqual({ kind: 'cell', cell: 'upper/along' });
    expect(nextStep(standing([theirReading], undefined))).toEqual({
      kind: 'cell',
      cell: 'upper/across',
    });
    expect(nextStep(standing([theirReading], 'upper/along'))).toEqual({
      kind: 'cell',
      cell: 'upper/along',
    });
  });
});

describe('an independent set', () => {
  it('is led through its bores alone, and both sets are seen after the last', () => {
    const [, other] = positionsOf(TWIN);
    if (other === undefined) throw new Error('one bore only');
    const full = ['upper/along', 'upper/across', 'lower/along', 'lower/across'];
    const bores = positionsOf(TWIN).map((one) => `${one.cylinder} ${one.valve}`);
    const done = full.map((cell, at) => {
      const [depth = '', axis = ''] = cell.split('/');
      return theirs(`b${at + 1}`, '0.8422', {
        depth,
        axis,
        set: 2,
        place: { bank: first.bank, cylinder: String(first.cylinder), valve: first.valve },
      });
    });
    const at = (second: readonly string[]): Standing => ({
      part: lifter,
      parts,
      cursor: { bore: bores[0] ?? '', part: lifter.key, set: 2 },
      setUp,
      positions: positionsOf(TWIN),
      position: first,
      judged: judgeReadings(done, []),
      outOfReach: new Set(),
      asked: askedBy(setUp, []),
      second,
    });
    expect(nextStep(at(bores.slice(0, 1)))).toEqual({ kind: 'both' });
    expect(nextStep(at(bores))).toEqual({ kind: 'bore', to: other });
  });

  it('is told nothing of the set that is hidden from it, nor of a strike in it', () => {
    const rows = {
      ...NONE,
      readings: [theirs('b5', '0.8426'), theirs('b6', '0.8421', { place: exhaust })],
      remarks: [remark('c7', 'strike', { readingId: 'b5', takenBy: 'other', place: intake })],
    };
    const seen = hideFirst(rows, { bores: ['1 intake'], set: 2 });
    const judged = judgeReadings(seen.readings, seen.remarks);
    const whose = whoseFrom(sheetWith([]), NONE, new Set());
    expect(JSON.stringify(judged)).not.toContain('0.8426');
    expect(lastHeard(seen, judged, NONE, whose)).toEqual({
      by: 'Marit Quell',
      words: '1 exhaust 0.8421',
    });
  });
});

describe('whose a reading is', () => {
  it('names another person, and another tablet of one’s own', () => {
    const onPage = { ...NONE, readings: [body('b1', '0.8422')] };
    const whose = whoseFrom(sheetWith([]), onPage, new Set(['b2']));
    expect(whose(body('b1', '0.8422'))).toBeUndefined();
    expect(whose(body('b2', '0.8422'))).toBeUndefined();
    expect(whose(body('b3', '0.8422'))).toBe('another tablet');
    expect(whose(theirs('b4', '0.8422'))).toBe('Marit Quell');
    expect(whose(theirs('b4', '0.8422', { takenBy: 'nobody' }))).toBe('another inspector');
  });

  it('tells of the last thing that came: a reading, then its strike; never of what was there before', () => {
    const reading = theirs('b4', '0.8422');
    const strike = remark('c5', 'strike', { readingId: 'b4', takenBy: 'other', place: intake });
    const heard = (remarks: SheetRows['remarks'], onPage: SheetRows = NONE) =>
      lastHeard(
        { remarks },
        judgeReadings([reading], remarks),
        onPage,
        whoseFrom(sheetWith([]), onPage, new Set()),
      );
    expect(heard([])).toEqual({ by: 'Marit Quell', words: '1 intake 0.8422' });
    expect(heard([strike])).toEqual({ by: 'Marit Quell', words: '1 intake 0.8422 struck' });
    expect(heard([], { ...NONE, readings: [reading] })).toBeUndefined();
    // Until this tablet records the next.
    const own = body('b6', '0.8421', { depth: 'lower' });
    const whose = whoseFrom(sheetWith([]), NONE, new Set(['b6']));
    expect(
      lastHeard({ remarks: [] }, judgeReadings([reading, own], []), NONE, whose),
    ).toBeUndefined();
  });
});

describe('batches', () => {
  it('of this tablet alone need no reading; another’s between them does', () => {
    const seen = seenFrom(3);
    expect(seen.has(4)).toBe(false);
    seen.sent(4);
    seen.sent(6);
    expect([4, 5, 6].map(seen.has)).toEqual([true, false, false]);
    seen.read(5);
    expect(seen.has(6)).toBe(true);
    seen.read(2);
    expect(seen.has(6)).toBe(true);
  });

  it('are read one after the other: many asked at once are two readings', async () => {
    let count = 0;
    const ends: (() => void)[] = [];
    const ask = oneAtATime(() => {
      count += 1;
      return new Promise<void>((resolve) => ends.push(resolve));
    });
    for (let i = 0; i < 5; i += 1) ask();
    expect(count).toBe(1);
    ends.shift()?.();
    await Promise.resolve();
    await Promise.resolve();
    expect(count).toBe(2);
    ends.shift()?.();
    await Promise.resolve();
    await Promise.resolve();
    ask();
    expect(count).toBe(3);
  });
});
