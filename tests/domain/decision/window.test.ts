import { describe, expect, it } from 'vitest';
import { assess } from '@/domain/decision/assess';
import { contains, isEmpty, narrowed, reachesAnEnd, widened } from '@/domain/decision/window';
import { rational, toNumber } from '@/domain/quantity/rational';
import { typed } from '../quantity/build';

const at = (n: number) => rational(BigInt(n));
const end = (n: number, closed = true) => ({ at: at(n), closed });
const window = { low: end(10), high: end(20) };

describe('a window', () => {
  it('holds its closed ends and not its open ones', () => {
    expect([9, 10, 15, 20, 21].map((n) => contains(window, at(n)))).toEqual([
      false,
      true,
      true,
      true,
      false,
    ]);
    expect(
      [10, 20].map((n) => contains({ low: end(10, false), high: end(20, false) }, at(n))),
    ).toEqual([false, false]);
    expect(contains({ high: end(20) }, at(-1000))).toBe(true);
  });

  it('is reached by a value whose width touches an end, from either side', () => {
    const reached = (n: number) => reachesAnEnd(window, at(n), at(2));
    expect([7, 8, 10, 12, 13, 17, 18, 20, 22, 23].map(reached)).toEqual([
      false,
      true,
      true,
      true,
      false,
      false,
      true,
      true,
      true,
      false,
    ]);
  });

  it('narrows until nothing is left, and widens', () => {
    expect(isEmpty(narrowed(window, at(5)))).toBe(false);
    expect(isEmpty(narrowed(window, at(6)))).toBe(true);
    expect(contains(widened(window, at(6)), at(26))).toBe(true);
  });
});

describe('acceptance', () => {
  it('of ILAC-G8’s four statements lies U inside the limit', () => {
    const found = assess(
      {
        limits: { max: typed('ratio', '10') },
        decisionRule: { kind: 'ilac-g8-four' },
        comparison: { method: 'absolute' },
      },
      { value: typed('ratio', '5'), standardUncertainty: 0.5 },
    );
    const max = found.acceptance?.max?.value ?? at(0);
    expect(toNumber(max)).toBeCloseTo(10 - found.expandedUncertainty, 8);
  });
});
