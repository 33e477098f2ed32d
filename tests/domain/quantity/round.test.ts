import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { decimalText } from '@/domain/quantity/decimal-text';
import { compare, fromDecimalText, rational, sub, toNumber } from '@/domain/quantity/rational';
import {
  awayFromZero,
  down,
  halfAwayFromZero,
  halfEven,
  outward,
  roundToDecimals,
  up,
} from '@/domain/quantity/round';
import { checkValue, provenance } from '../../support/check-value';

const sp811 = checkValue('sp811-B.7.1');

describe('rounding rules by name', () => {
  it(`half to even: ${provenance(sp811)}`, () => {
    const cases = sp811.inputs['cases'] as readonly (readonly [string, number])[];
    const rounded = cases.map(([text, digits]) => {
      const value = roundToDecimals(fromDecimalText(text), digits - 1, halfEven);
      return decimalText(value, 0).padEnd(digits + 1, '0');
    });
    expect(rounded).toEqual(sp811.expected['rounded']);
  });

  it.each([
    ['2.5', 2n, 3n, 2n, 3n, 3n],
    ['3.5', 4n, 4n, 3n, 4n, 4n],
    ['-2.5', -2n, -3n, -3n, -2n, -3n],
    ['-2.4', -2n, -2n, -3n, -2n, -3n],
    ['2.6', 3n, 3n, 2n, 3n, 3n],
    ['-3', -3n, -3n, -3n, -3n, -3n],
  ])('%s', (text, even, away, below, above, outer) => {
    const value = fromDecimalText(text);
    expect([halfEven, halfAwayFromZero, down, up, awayFromZero].map((rule) => rule(value))).toEqual(
      [even, away, below, above, outer],
    );
  });

  it('outward never shrinks an interval', () => {
    const step = rational(1n, 7n);
    fc.assert(
      fc.property(fc.bigInt(-9999n, 9999n), fc.bigInt(0n, 9999n), (low, width) => {
        const interval = { low: rational(low, 100n), high: rational(low + width, 100n) };
        const grown = outward(interval, step);
        expect(compare(grown.low, interval.low)).toBeLessThanOrEqual(0);
        expect(compare(grown.high, interval.high)).toBeGreaterThanOrEqual(0);
        expect(toNumber(sub(interval.low, grown.low))).toBeLessThan(1 / 7);
      }),
    );
  });
});
