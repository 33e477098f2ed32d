import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  compareClauseNumbers,
  findParentNumber,
  isClauseNumber,
  sortClauses,
} from '@/domain/rulebook/clause';

const segments = fc.array(fc.integer({ min: 1, max: 9999 }), { minLength: 1, maxLength: 8 });
const number = segments.map((parts) => parts.join('.'));

describe('clause numbers', () => {
  it('sort as a tree, ten after nine', () => {
    const numbers = ['8', '7.4.10', '7.10', '7.4', '7', '7.4.9', '7.4.9.1', '10', '2'];
    expect(sortClauses(numbers.map((row) => ({ number: row }))).map((row) => row.number)).toEqual([
      '2',
      '7',
      '7.4',
      '7.4.9',
      '7.4.9.1',
      '7.4.10',
      '7.10',
      '8',
      '10',
    ]);
  });

  it('have one order, whatever the order they are given in', () => {
    fc.assert(
      fc.property(fc.array(number), fc.array(fc.nat()), (numbers, swaps) => {
        const rows = [...new Set(numbers)].map((row) => ({ number: row }));
        const shuffled = [...rows].sort(
          (a, b) => (swaps[a.number.length] ?? 0) - (swaps[b.number.length] ?? 1),
        );
        expect(sortClauses(shuffled)).toEqual(sortClauses(rows));
      }),
    );
  });

  it('stand below their parent', () => {
    fc.assert(
      fc.property(number, (child) => {
        const parent = findParentNumber(child);
        if (parent === undefined) expect(child).not.toContain('.');
        else {
          expect(compareClauseNumbers(parent, child)).toBeLessThan(0);
          expect(child.startsWith(`${parent}.`)).toBe(true);
        }
        expect(isClauseNumber(child)).toBe(true);
      }),
    );
  });

  it.each(['', '7.', '.7', '7..4', '07', '7.0', '7.4a', '7,4', ' 7', '1.1.1.1.1.1.1.1.1', '12345'])(
    'are not %j',
    (text) => {
      expect(isClauseNumber(text)).toBe(false);
    },
  );
});
