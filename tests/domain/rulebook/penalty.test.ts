import { describe, expect, it } from 'vitest';
import { findAmbiguities } from '@/domain/rulebook/ambiguity/find-ambiguities';
import { penaltyFor } from '@/domain/rulebook/edition';
import { clause } from './build';

const row = {
  row: 'A',
  breach: 'A part',
  penalties: ['first', 'second', 'later'],
  carriesOver: true,
};
const season = { name: '2026', previous: '2025' };
const breach = (year: string, of = 'A') => ({ row: of, season: year });

describe('the next step of a penalty', () => {
  it.each([
    ['none before', [], 1, 'first'],
    ['one this season', [breach('2026')], 2, 'second'],
    ['one last season, carried over', [breach('2025')], 2, 'second'],
    ['one long ago', [breach('2024')], 1, 'first'],
    ['one of another row', [breach('2026', 'B')], 1, 'first'],
    [
      'more than there are steps',
      [breach('2026'), breach('2026'), breach('2026'), breach('2025')],
      5,
      'later',
    ],
  ])('after %s', (_, earlier, step, words) => {
    expect(penaltyFor(row, earlier, season)).toEqual({ step, words });
  });

  it('starts anew each season where the row does not carry over', () => {
    expect(penaltyFor({ ...row, carriesOver: false }, [breach('2025')], season).step).toBe(1);
  });
});

describe('a penalty schedule that cannot be published', () => {
  const clauses = [clause(undefined, { force: 'judged' })];
  it.each([
    ['two rows of one name', [row, row], '/penalties/1/row', /two rows A/],
    [
      'a row that costs nothing',
      [{ ...row, penalties: [] }],
      '/penalties/0/penalties',
      /what the first breach costs/,
    ],
    [
      'an empty step',
      [{ ...row, penalties: ['first', ' '] }],
      '/penalties/0/penalties/1',
      /what this step costs/,
    ],
    ['a row without a name', [{ ...row, row: ' ' }], '/penalties/0/row', /name/],
  ])('%s', (_, penalties, pointer, words) => {
    const fault = findAmbiguities(clauses, penalties).find((found) => found.pointer === pointer);
    expect(fault?.detail).toMatch(words);
  });
});
