import { describe, expect, it } from 'vitest';
import { type CustodyAct, custodyOf } from '@/domain/inspection/custody/chain';
import { type SealAct, sealHistoryOf } from '@/domain/inspection/custody/seals';

const at = (minute: number) => new Date(Date.UTC(2026, 6, 16, 2, minute)).toISOString();
const rows = (...acts: readonly CustodyAct[]) =>
  acts.map((act, i) => ({ id: `c${i}`, tag: 'T1', at: at(i), act }));
const over = (from: string, to: string): CustodyAct => ({
  kind: 'hand-over',
  from,
  to,
  reason: 'night',
  place: 'barn',
});
const taken: CustodyAct = { kind: 'taken', from: 'car 12J', by: 'Ann', place: 'bay 1' };

describe('custody', () => {
  it('knows the holder through every hand-over, in the order of time', () => {
    const chain = rows(taken, over('Ann', 'Ben'), over('Ben', 'Cal'));
    expect(custodyOf('T1', [...chain].reverse())).toMatchObject({ holder: 'Cal', gaps: [] });
    expect(custodyOf('T2', chain)).toMatchObject({ holder: undefined, rows: [] });
  });

  it('ends with the return', () => {
    expect(
      custodyOf('T1', rows(taken, { kind: 'returned', from: 'Ann', to: 'Dee' })),
    ).toMatchObject({ holder: undefined, gaps: [] });
  });

  it.each<[string, readonly CustodyAct[], RegExp]>([
    [
      'a giver who did not have it',
      [taken, over('Ben', 'Cal')],
      /Ben acted on it; the last on record as holding it is Ann/,
    ],
    ['never taken', [over('Ann', 'Ben')], /Nobody is on record/],
    ['taken twice', [taken, { ...taken, by: 'Ben' }], /Taken again while Ann held it/],
    [
      'after its return',
      [taken, { kind: 'returned', from: 'Ann', to: 'Dee' }, over('Ann', 'Ben')],
      /after it was returned/,
    ],
    [
      'opened without a witness',
      [taken, { kind: 'bag-opened', by: 'Ann', witness: ' ', reason: 'look', bag: 'B1' }],
      /without a witness/,
    ],
    [
      'handed on open',
      [
        taken,
        { kind: 'bag-opened', by: 'Ann', witness: 'Ben', reason: 'look', bag: 'B1' },
        over('Ann', 'Cal'),
      ],
      /bag B1 open/,
    ],
  ])('shows a gap: %s', (_, acts, words) => {
    const { gaps } = custodyOf('T1', rows(...acts));
    expect(gaps).toHaveLength(1);
    expect(gaps[0]?.words).toMatch(words);
    expect(gaps[0]?.before).toBe(`c${acts.length - 1}`);
  });

  it('has no gap where a bag was opened before a witness and closed again', () => {
    const acts: readonly CustodyAct[] = [
      taken,
      { kind: 'bag-opened', by: 'Ann', witness: 'Ben', reason: 'look', bag: 'B1' },
      { kind: 'bag-closed', by: 'Ann', bag: 'B2' },
      over('Ann', 'Cal'),
    ];
    expect(custodyOf('T1', rows(...acts))).toMatchObject({
      gaps: [],
      openBag: undefined,
      holder: 'Cal',
    });
  });
});

describe('seals', () => {
  const history = (...acts: readonly SealAct[]) =>
    sealHistoryOf(acts.map((act, i) => ({ id: `s${i}`, at: at(i), act })));
  const applied: SealAct = { kind: 'applied', number: '101', place: 'intake', by: 'Ann' };

  it.each<[string, readonly SealAct[], RegExp | undefined]>([
    [
      'found as applied',
      [applied, { kind: 'found', number: '101', place: 'intake', state: 'intact' }],
      undefined,
    ],
    [
      'removed and replaced',
      [
        applied,
        { kind: 'removed', number: '101', place: 'intake', by: 'Ann' },
        { ...applied, number: '102' },
      ],
      undefined,
    ],
    [
      'broken',
      [applied, { kind: 'found', number: '101', place: 'intake', state: 'broken' }],
      /found broken/,
    ],
    [
      'another number',
      [applied, { kind: 'found', number: '999', place: 'intake', state: 'intact' }],
      /999.*101 is on record/,
    ],
    [
      'found where none was',
      [{ kind: 'found', number: '5', place: 'pan', state: 'intact' }],
      /none is on record/,
    ],
    [
      'another one removed',
      [applied, { kind: 'removed', number: '999', place: 'intake', by: 'Ann' }],
      /removed.*101 is on record/,
    ],
    ['applied over another', [applied, { ...applied, number: '102' }], /over seal 101/],
  ])('%s', (_, acts, words) => {
    const { faults } = history(...acts);
    if (words === undefined) expect(faults).toEqual([]);
    else expect(faults[0]?.words).toMatch(words);
  });

  it('knows what should be there now', () => {
    expect(history(applied).onRecord.get('intake')).toBe('101');
    expect(
      history(applied, { kind: 'removed', number: '101', place: 'intake', by: 'Ann' }).onRecord
        .size,
    ).toBe(0);
  });
});
