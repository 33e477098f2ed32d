import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { assess } from '@/domain/decision/assess';
import type { DecisionRule } from '@/domain/decision/decision-rule';
import type { LimitRequirement } from '@/domain/decision/requirement';
import { scaledText } from '@/domain/quantity/decimal-text';
import { inches, inMetres } from '../quantity/build';
import { type Case, oracle, type Told } from './oracle';

const text = (tenMillionths: number): string => scaledText(BigInt(tenMillionths), 7);

const ruleOf = ({ rule, guardFactor }: Case): DecisionRule =>
  rule === 'simple'
    ? { kind: 'simple' }
    : guardFactor === null
      ? { kind: rule }
      : { kind: rule, guardFactor: String(guardFactor) };

const told = (one: Case): Told => {
  const requirement: LimitRequirement<'length'> = {
    limits: {
      ...(one.min !== null && { min: inches(text(one.min)) }),
      ...(one.max !== null && { max: inches(text(one.max)) }),
    },
    decisionRule: ruleOf(one),
    comparison:
      one.decimals === null
        ? { method: 'absolute' }
        : { method: 'rounded', decimals: one.decimals },
  };
  const { assessment, complies, fit, fourState } = assess(requirement, {
    value: inches(text(one.value)),
    standardUncertainty: inMetres(one.u * 1e-7),
  });
  return { assessment, complies, fit, fourState };
};

// Limits on whole steps of their decimals, values near one of them and often on it, on its half step, or
// on the edge of a guard band of a whole number.
const cases: fc.Arbitrary<Case> = fc
  .record({
    decimals: fc.constantFrom<Case['decimals']>(null, 3, 4, 5),
    low: fc.integer({ min: -40, max: 40 }),
    width: fc.integer({ min: 0, max: 20 }),
    // Now and then a limit written finer than values are rounded to.
    skew: fc.constantFrom(0, 0, 0, 0.3, -0.5),
    ends: fc.constantFrom('min', 'max', 'both'),
    at: fc.constantFrom('low', 'high'),
    off: fc.constantFrom(0, 0, 1, -1, 0.5, -0.5),
    nudge: fc.constantFrom(0, 0, 0, 1, -1, 2, -2, 40, -40),
    u: fc.oneof(
      fc.constant(0),
      fc.integer({ min: 1, max: 400 }),
      fc.integer({ min: 1, max: 20_000 }),
    ),
    rule: fc.constantFrom<Case['rule']>('simple', 'guarded-acceptance', 'guarded-rejection'),
    guardFactor: fc.constantFrom(null, 0, 0.5, 1, 2),
  })
  .map(({ decimals, low, width, skew, ends, at, off, nudge, ...rest }) => {
    const step = 10 ** (7 - (decimals ?? 4));
    const min = Math.round((low + skew) * step);
    const max = Math.round((low + width + skew) * step);
    return {
      ...rest,
      decimals,
      min: ends === 'max' ? null : min,
      max: ends === 'min' ? null : max,
      value: (at === 'low' ? min : max) + Math.round(off * step) + nudge,
    };
  });

describe('assess against an independent oracle', () => {
  it('agrees on 100,000 random cases around the limits', { timeout: 120_000 }, () => {
    let onALimit = 0;
    let count = 0;
    fc.assert(
      fc.property(cases, (one) => {
        count += 1;
        if (one.value === one.min || one.value === one.max) onALimit += 1;
        const [found, expected] = [told(one), oracle(one)];
        // A deep comparison of matchers costs more than both computations.
        if (JSON.stringify(order(found)) !== JSON.stringify(order(expected)))
          expect(found).toEqual(expected);
      }),
      { numRuns: 100_000 },
    );
    expect(count).toBe(100_000);
    expect(onALimit).toBeGreaterThan(5_000);
  });

  const order = ({ assessment, complies, fit, fourState }: Told) => [
    assessment,
    complies,
    fit,
    fourState,
  ];
});
