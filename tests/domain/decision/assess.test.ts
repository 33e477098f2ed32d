import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { assess } from '@/domain/decision/assess';
import { type DecisionRule, decisionRuleFault } from '@/domain/decision/decision-rule';
import { onGridOutward } from '@/domain/decision/on-grid-outward';
import type { LimitRequirement } from '@/domain/decision/requirement';
import { scaledText } from '@/domain/quantity/decimal-text';
import { compare, div, equal, fromDecimalText, rational } from '@/domain/quantity/rational';
import { gridOf } from '@/domain/quantity/stored';
import { degrees, inches, inMetres, millimetres } from '../quantity/build';

const RULES: readonly DecisionRule[] = [
  { kind: 'simple' },
  { kind: 'guarded-acceptance' },
  { kind: 'guarded-acceptance', guardFactor: '1' },
  { kind: 'guarded-rejection' },
  { kind: 'guarded-rejection', guardFactor: '1' },
  { kind: 'guarded-rejection', probability: 0.99 },
  { kind: 'iso14253' },
  { kind: 'conformance-probability', probability: 0.95 },
  { kind: 'ilac-g8-four' },
];

const flatTappet = (decisionRule: DecisionRule): LimitRequirement<'length'> => ({
  limits: { min: inches('0.0013'), max: inches('0.0019') },
  decisionRule,
  comparison: { method: 'absolute' },
});

describe('a value against a window of 0.0013 to 0.0019 in', () => {
  const measured = (text: string, u = 0.00005) => ({
    value: inches(text),
    standardUncertainty: inMetres(u),
  });
  const complies = (rule: DecisionRule, text: string, u?: number) =>
    assess(flatTappet(rule), measured(text, u)).complies;

  it('decides equality with a limit exactly, in any unit', () => {
    const simple = { kind: 'simple' } as const;
    for (const text of ['0.0013', '0.00190', '1.9 thou', '19 tenths', '0.04826 mm', '48.26 µm'])
      expect(complies(simple, text, 0), text).toBe(true);
    for (const text of ['0.00190001', '0.04826001 mm', '0.00129999'])
      expect(complies(simple, text, 0), text).toBe(false);
  });

  it('gives the benefit of the doubt as the rule says', () => {
    // u = 0.00005 in: U = 0.000098, guard band 0.0000822 in.
    expect(RULES.map((rule) => [rule.kind, complies(rule, '0.00195')])).toEqual([
      ['simple', false],
      ['guarded-acceptance', false],
      ['guarded-acceptance', false],
      ['guarded-rejection', true],
      ['guarded-rejection', true],
      ['guarded-rejection', true],
      ['iso14253', null],
      ['conformance-probability', false],
      ['ilac-g8-four', null],
    ]);
    expect(complies({ kind: 'guarded-rejection' }, '0.0019822')).toBe(true);
    expect(complies({ kind: 'guarded-rejection' }, '0.0019823')).toBe(false);
  });

  it('is too close to call where value ± U reaches a limit, whatever the rule', () => {
    for (const rule of RULES) {
      expect(assess(flatTappet(rule), measured('0.0018')).assessment).toBe('within');
      expect(assess(flatTappet(rule), measured('0.00181')).assessment).toBe('too-close');
      expect(assess(flatTappet(rule), measured('0.00199')).assessment).toBe('too-close');
      expect(assess(flatTappet(rule), measured('0.0020')).assessment).toBe('outside');
    }
  });

  it('never acquits by guarded rejection on an unfit gauge, and still shows a breach', () => {
    const rule = { kind: 'guarded-rejection' } as const;
    const inside = assess(flatTappet(rule), measured('0.0016', 0.0005));
    expect(inside).toMatchObject({ fit: false, complies: null });
    expect(inside.sentence).toContain('not fit');
    const far = assess(flatTappet(rule), measured('0.0060', 0.0005));
    expect(far).toMatchObject({ fit: false, complies: false, assessment: 'outside' });
  });

  it('leaves no room for acceptance when the guard band is wider than the window', () => {
    const found = assess(flatTappet({ kind: 'guarded-acceptance' }), measured('0.0016', 0.0005));
    expect(found).toMatchObject({ acceptance: null, complies: false });
  });

  it('takes t where degrees of freedom are few, cut to a whole number', () => {
    const few = assess(flatTappet({ kind: 'simple' }), {
      ...measured('0.0016'),
      degreesOfFreedom: 4.9,
    });
    expect(few.distribution).toBe('t');
    expect(few.coverageFactor).toBeCloseTo(2.7764, 4);
    const many = assess(flatTappet({ kind: 'simple' }), {
      ...measured('0.0016'),
      degreesOfFreedom: null,
    });
    expect(many).toMatchObject({ distribution: 'normal' });
    expect(many.coverageFactor).toBeCloseTo(1.95996, 5);
  });

  it('says each rule in one sentence with its numbers', () => {
    const sentence = (rule: DecisionRule) => assess(flatTappet(rule), measured('0.0016')).sentence;
    expect(sentence({ kind: 'guarded-rejection' })).toBe(
      'A value breaches this clause only when it lies past the limit by more than its guard band of 0.00008 in (one-sided 95 %): here from 0.00122 in to 0.00198 in the competitor has the benefit of the doubt.',
    );
    expect(sentence({ kind: 'guarded-acceptance', guardFactor: '1' })).toBe(
      'A value complies only when it lies inside the limits by its guard band of 0.00010 in (the expanded uncertainty U): here from 0.00140 in to 0.00180 in.',
    );
    expect(sentence({ kind: 'simple' })).toBe(
      'The value as measured decides: it complies from 0.0013 in to 0.0019 in, a value equal to a limit included.',
    );
    for (const rule of RULES) expect(sentence(rule)).toMatch(/^[A-Z].+\.$/);
  });
});

describe('one-sided limits', () => {
  const requirement: LimitRequirement<'length'> = {
    limits: { max: inches('0.0010') },
    decisionRule: { kind: 'guarded-rejection', guardFactor: '1' },
    comparison: { method: 'absolute' },
  };
  const measured = (u: number) => ({ value: inches('0.0011'), standardUncertainty: inMetres(u) });

  it('has no ratio; the clause’s largest allowed U makes the gauge fit or not', () => {
    expect(assess(requirement, measured(0.0001))).toMatchObject({
      ratio: null,
      fit: true,
      complies: true,
    });
    const stated = { ...requirement, maximumUncertainty: inches('0.0001') };
    expect(assess(stated, measured(0.00005))).toMatchObject({ fit: true });
    expect(assess(stated, measured(0.0001))).toMatchObject({ fit: false, complies: null });
  });

  it('works on temperatures, whose widths have no zero', () => {
    const found = assess(
      {
        limits: { max: degrees('140 °F') },
        decisionRule: { kind: 'guarded-rejection' },
        comparison: { method: 'absolute' },
      },
      { value: degrees('61 °C'), standardUncertainty: 1 },
    );
    expect(found).toMatchObject({ complies: true, assessment: 'too-close' });
    expect(found.acceptance?.max?.text).toMatch(/^142\.96/);
    expect(found.sentence).toContain('2.9 °F');
  });
});

describe('what a rule may say', () => {
  it('refuses a guard band stated twice, and numbers that make none', () => {
    expect(
      decisionRuleFault({ kind: 'guarded-rejection', guardFactor: '1', probability: 0.95 }),
    ).toMatch(/not by both/);
    expect(decisionRuleFault({ kind: 'guarded-rejection', guardFactor: 'x' })).toBeDefined();
    expect(decisionRuleFault({ kind: 'guarded-rejection', guardFactor: '-1' })).toBeDefined();
    expect(decisionRuleFault({ kind: 'conformance-probability', probability: 1.2 })).toBeDefined();
    for (const rule of RULES) expect(decisionRuleFault(rule)).toBeUndefined();
    expect(() =>
      assess(flatTappet({ kind: 'guarded-rejection', guardFactor: 'x' }), {
        value: inches('0'),
        standardUncertainty: 0,
      }),
    ).toThrow(RangeError);
  });

  it('rounds a width outward once, noise of doubles aside', () => {
    const grid = gridOf('length');
    const steps = (width: number) => div(onGridOutward(width, grid), grid);
    expect(equal(steps(0.000125 * 0.0254), rational(3_175_000n))).toBe(true);
    expect(equal(steps(3.1750001e-6), rational(3_175_001n))).toBe(true);
    expect(equal(steps(1e-15), rational(1n))).toBe(true);
    expect(() => onGridOutward(Number.NaN, grid)).toThrow(RangeError);
    expect(() => onGridOutward(-1, grid)).toThrow(RangeError);
  });
});

describe('properties', () => {
  const tenths = fc.integer({ min: -300, max: 300 });
  const text = (n: number) => scaledText(BigInt(n), 5);

  it('tightening a limit never turns outside into within, nor a breach into a pass', () => {
    fc.assert(
      fc.property(
        fc.record({
          low: tenths,
          width: fc.nat(200),
          by: fc.nat(100),
          end: fc.constantFrom('min', 'max'),
          value: tenths,
        }),
        fc.integer({ min: 0, max: 2000 }),
        fc.constantFrom(...RULES),
        fc.constantFrom(
          { method: 'absolute' } as const,
          { method: 'rounded', decimals: 4 } as const,
        ),
        ({ low, width, by, end, value }, u, decisionRule, comparison) => {
          const high = low + width;
          const requirement = (min: number, max: number): LimitRequirement<'length'> => ({
            limits: { min: inches(text(min)), max: inches(text(max)) },
            decisionRule,
            comparison,
          });
          const measured = { value: inches(text(value)), standardUncertainty: inMetres(u * 1e-7) };
          const wide = assess(requirement(low, high), measured);
          const tight = assess(
            end === 'min' ? requirement(low + by, high) : requirement(low, high - by),
            measured,
          );
          if (wide.assessment === 'outside') expect(tight.assessment).not.toBe('within');
          if (wide.complies === false) expect(tight.complies).not.toBe(true);
          expect(tight.conformanceProbability).toBeLessThanOrEqual(
            wide.conformanceProbability + 1e-12,
          );
        },
      ),
      { numRuns: 3000 },
    );
  });

  it('the unit a value is written in does not change a decision', () => {
    fc.assert(
      fc.property(tenths, fc.constantFrom(...RULES), fc.nat(1000), (value, decisionRule, u) => {
        const standardUncertainty = inMetres(u * 1e-7);
        const byInches = assess(flatTappet(decisionRule), {
          value: inches(text(value)),
          standardUncertainty,
        });
        const inMillimetres = millimetres(scaledText(BigInt(value) * 254n, 6));
        expect(compare(inMillimetres.value, inches(text(value)).value)).toBe(0);
        expect(
          assess(flatTappet(decisionRule), { value: inMillimetres, standardUncertainty }),
        ).toEqual(byInches);
      }),
      { numRuns: 500 },
    );
  });

  it('reads its numbers exactly', () => {
    expect(compare(inches('0.0019').value, fromDecimalText('0.00004826'))).toBe(0);
  });
});
