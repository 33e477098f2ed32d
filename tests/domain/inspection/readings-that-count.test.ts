import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { judgeReadings, readingsThatCount } from '@/domain/inspection/capture/readings-that-count';
import { positionKey, WHOLE_ENGINE } from '@/domain/inspection/capture/rows';
import { isStrikeReason } from '@/domain/inspection/capture/strike-reasons';
import { exhaust, intake, reading, remark } from './build';

const ids = (rows: ReturnType<typeof readingsThatCount>) => rows.map(({ row }) => row.id);

describe('readings that count', () => {
  const rows = [reading('r1', '0.8440'), reading('r2', '0.8441'), reading('r3', '0.8442')];

  it('are all that were accepted, once each, in taking order', () => {
    expect(ids(readingsThatCount([...rows].reverse(), []))).toEqual(['r1', 'r2', 'r3']);
    expect(ids(readingsThatCount([...rows, ...rows], []))).toEqual(['r1', 'r2', 'r3']);
  });

  it('leave out the struck one, which stays on record with its reason', () => {
    const strike = remark('s9', 'strike', { readingId: 'r2', reason: 'sign-lost' });
    expect(ids(readingsThatCount(rows, [strike]))).toEqual(['r1', 'r3']);
    expect(judgeReadings(rows, [strike])[1]).toMatchObject({
      row: { id: 'r2' },
      state: 'struck',
      reason: 'sign-lost',
    });
  });

  it('stand where the last move put them, and say where they were written', () => {
    const moves = [
      remark('m6', 'move', { readingId: 'r1', place: intake }),
      remark('m5', 'move', { readingId: 'r1', place: exhaust }),
    ];
    const [first] = judgeReadings([reading('r1', '0.8440', { place: exhaust })], moves);
    expect(first).toMatchObject({ place: intake, movedFrom: exhaust, state: 'counts' });
  });

  it('leave out what was received and not accepted, and what late remarks say', () => {
    const late = reading('r4', '0.8450', { standing: 'received' });
    const strike = remark('s9', 'strike', { readingId: 'r1', standing: 'received' });
    const judged = judgeReadings([...rows, late], [strike]);
    expect(judged.map((row) => row.state)).toEqual(['counts', 'counts', 'counts', 'received']);
  });

  it('do not depend on the order of arrival', () => {
    const remarks = [
      remark('s7', 'strike', { readingId: 'r2' }),
      remark('m8', 'move', { readingId: 'r3', place: exhaust }),
      remark('m9', 'move', { readingId: 'r3', place: intake }),
    ];
    const expected = judgeReadings(rows, remarks);
    fc.assert(
      fc.property(
        fc.shuffledSubarray(rows, { minLength: 3 }),
        fc.shuffledSubarray(remarks, { minLength: 3 }),
        (someRows, someRemarks) => {
          expect(judgeReadings(someRows, someRemarks)).toEqual(expected);
        },
      ),
    );
  });
});

describe('a place', () => {
  it.each([
    [intake, 'bore', '1 intake'],
    [intake, 'lifter', '1 intake'],
    [{ ...intake, index: 2 }, 'bore', '1 intake 2'],
    [intake, 'cylinder', '1'],
    [intake, 'engine', 'engine'],
    [{ bank: '', cylinder: '3', valve: '' }, 'bore', '3'],
    [WHOLE_ENGINE, 'bore', 'engine'],
    [WHOLE_ENGINE, 'car', 'car'],
  ] as const)('%j per %s is %s', (place, per, key) => {
    expect(positionKey(place, per)).toBe(key);
  });
});

it('strike reasons come from the list', () => {
  expect(['sign-lost', 'because', 'toString'].map(isStrikeReason)).toEqual([true, false, false]);
});
