import { describe, expect, it } from 'vitest';
import { assess } from '@/domain/decision/assess';
import type { DecisionRule } from '@/domain/decision/decision-rule';
import { spreadOf } from '@/domain/decision/probability/coverage';
import { globalRisk } from '@/domain/decision/probability/risk';
import type { Comparison, LimitRequirement } from '@/domain/decision/requirement';
import { asciiIn } from '@/domain/quantity/format';
import { compareQuantities } from '@/domain/quantity/quantity';
import { fromDecimalText, toNumber } from '@/domain/quantity/rational';
import { halfEven, roundToDecimals, up } from '@/domain/quantity/round';
import { checkValue, provenance } from '../../support/check-value';
import { inches, inMetres, typed } from '../quantity/build';

/** A plain number: the published examples are of many quantities; the ratio's base is 1. */
const number = (text: string) => typed('ratio', text);
const absolute: Comparison = { method: 'absolute' };
const against = (
  limits: { readonly min?: string; readonly max?: string },
  decisionRule: DecisionRule = { kind: 'simple' },
  comparison: Comparison = absolute,
): LimitRequirement<'ratio'> => ({
  limits: {
    ...(limits.min !== undefined && { min: number(limits.min) }),
    ...(limits.max !== undefined && { max: number(limits.max) }),
  },
  decisionRule,
  comparison,
});

describe('JCGM 106', () => {
  const table1 = checkValue('jcgm106-table1-z');
  it(`one-sided z: ${provenance(table1)}`, () => {
    const z = table1.expected['z'] as readonly number[];
    (table1.inputs['pC'] as readonly number[]).forEach((p, i) => {
      expect(Math.abs(spreadOf(null).quantile(p) - (z[i] ?? Number.NaN))).toBeLessThan(
        table1.tolerance as number,
      );
    });
  });

  const zener = checkValue('jcgm106-7.3.3-ex1-zener');
  it(`conformance probability, one limit: ${provenance(zener)}`, () => {
    const found = assess(against({ max: '-5.40' }), {
      value: number('-5.47'),
      standardUncertainty: 0.05,
    });
    expect(Math.abs(found.conformanceProbability - (zener.expected['pC'] as number))).toBeLessThan(
      0.005,
    );
    expect(found.conformanceProbability).toBeCloseTo(0.9192433408, 9);
  });

  const oil = checkValue('jcgm106-7.4-sae40');
  it(`conformance probability, two limits: ${provenance(oil)}`, () => {
    const found = assess(against({ min: '12.5', max: '16.3' }), {
      value: number('13.6'),
      standardUncertainty: 1.8,
    });
    expect(Math.abs(found.conformanceProbability - (oil.expected['pC'] as number))).toBeLessThan(
      0.005,
    );
    expect(found.conformanceProbability).toBeCloseTo(0.66263, 5);
  });

  const speed = checkValue('jcgm106-8.3.3-speed');
  it(`guarded rejection: ${provenance(speed)}`, () => {
    // The uncertainty is 2 % of the speed itself, so the limit of citing is v with v − z·0.02·v = 100.
    const rule = {
      kind: 'guarded-rejection',
      probability: speed.inputs['probability'] as number,
    } as const;
    const v = 106.5876;
    const found = assess(against({ max: '100' }, rule), {
      value: number('106.5'),
      standardUncertainty: 0.02 * v,
    });
    const acceptance = found.acceptance?.max;
    expect(toNumber(acceptance?.value ?? number('0').value)).toBeCloseTo(v, 3);
    expect(Number(up(acceptance?.value ?? number('0').value))).toBe(speed.expected['vmax_kmh']);
    expect(found.complies).toBe(true);
    const over = assess(against({ max: '100' }, rule), {
      value: number('107'),
      standardUncertainty: 0.02 * v,
    });
    expect(over.complies).toBe(false);
  });

  const resistors = checkValue('jcgm106-resistors-global');
  it(`global risks: ${provenance(resistors)}`, () => {
    const parts = { mean: 1500, standardDeviation: 0.12, measurementUncertainty: 0.04 };
    const tolerance = [1499.8, 1500.2] as const;
    const simple = globalRisk({ ...parts, tolerance, acceptance: tolerance });
    const guarded = globalRisk({ ...parts, tolerance, acceptance: [1499.88, 1500.12] });
    const { expected } = resistors;
    expect(simple.consumer).toBeCloseTo(expected['RC_simple'] as number, 9);
    expect(simple.producer).toBeCloseTo(expected['RP_simple'] as number, 9);
    expect(guarded.consumer).toBeCloseTo(expected['RC_guarded'] as number, 9);
    expect(guarded.producer).toBeCloseTo(expected['RP_guarded'] as number, 9);
  });
});

describe('risks over a population', () => {
  const rp19 = checkValue('risk-rp19-table');
  it(`false accepts: ${provenance(rp19)}`, () => {
    const risks = (rp19.inputs['in_tolerance_prob'] as readonly number[]).map((inTolerance) => {
      const s = 1 / spreadOf(null).quantile((1 + inTolerance) / 2);
      const limits = [-1, 1] as const;
      return globalRisk({
        mean: 0,
        standardDeviation: s,
        measurementUncertainty: s / 4,
        tolerance: limits,
        acceptance: limits,
      });
    });
    const all = rp19.expected['unconditional_PFA_percent'] as readonly number[];
    const accepted = rp19.expected['conditional_PFA_percent'] as readonly number[];
    risks.forEach((risk, i) => {
      expect(Math.abs(100 * risk.consumer - (all[i] ?? 0))).toBeLessThan(rp19.tolerance as number);
      expect(Math.abs(100 * risk.amongAccepted - (accepted[i] ?? 0))).toBeLessThan(
        rp19.tolerance as number,
      );
    });
  });

  const deaver = checkValue('risk-deaver');
  it(`with and without a guard band: ${provenance(deaver)}`, () => {
    const limits = [-2, 2] as const;
    const parts = { mean: 0, standardDeviation: 1, tolerance: limits };
    const plain = globalRisk({ ...parts, measurementUncertainty: 0.25, acceptance: limits });
    const guarded = globalRisk({
      ...parts,
      measurementUncertainty: 0.5,
      acceptance: [-1.82, 1.82],
    });
    const found = {
      PFA1: plain.consumer,
      PFR1: plain.producer,
      PFA2: guarded.consumer,
      PFR2: guarded.producer,
    };
    for (const [name, value] of Object.entries(found))
      expect(Math.abs(value - (deaver.expected[name] as number)), name).toBeLessThan(
        deaver.tolerance as number,
      );
  });
});

describe('published decision rules', () => {
  const ilac = checkValue('ilac-g8-table1');
  it(`risk at the acceptance limit by guard band: ${provenance(ilac)}`, () => {
    const level = 0.954499736103642; // k = 2
    const bounds = [1e-6, 0.0016, 0.025, 0.05, 0.5];
    (ilac.inputs['w_over_U'] as readonly number[]).forEach((factor, i) => {
      const rule = { kind: 'guarded-acceptance', guardFactor: String(factor) } as const;
      const measured = { standardUncertainty: 0.5, level };
      const { acceptance } = assess(against({ max: '10' }, rule), {
        value: number('0'),
        ...measured,
      });
      const value = acceptance?.max ?? number('0');
      const found = assess(against({ max: '10' }, rule), { value, ...measured });
      expect(found.coverageFactor).toBeCloseTo(2, 9);
      expect(found.complies).toBe(true);
      const risk = 1 - found.conformanceProbability;
      if (factor === 0) expect(risk).toBeLessThanOrEqual(0.5);
      else expect(risk).toBeLessThan(bounds[i] ?? 0);
    });
  });

  it('four statements: ILAC-G8:09/2019, 4.2.3 (from memory): all of value ± U on one side, else conditional', () => {
    const states = ['9.0', '9.1', '10.0', '10.1', '10.9', '11.1'].map((text) => {
      const { fourState, complies } = assess(against({ max: '10' }, { kind: 'ilac-g8-four' }), {
        value: number(text),
        standardUncertainty: 0.5,
      });
      return [text, fourState, complies];
    });
    expect(states).toEqual([
      ['9.0', 'pass', true],
      ['9.1', 'conditional-pass', null],
      ['10.0', 'conditional-pass', null],
      ['10.1', 'conditional-fail', null],
      ['10.9', 'conditional-fail', null],
      ['11.1', 'fail', false],
    ]);
  });

  const iso = checkValue('iso14253-g');
  it(`default guard band: ${provenance(iso)}`, () => {
    const rule: DecisionRule = { kind: 'iso14253' };
    const at = (text: string) =>
      assess(against({ max: '10' }, rule), {
        value: number(text),
        standardUncertainty: 1,
        level: 0.954499736103642,
      });
    const band = 10 - toNumber(at('5').acceptance?.max?.value ?? number('0').value);
    expect(Math.abs(band - (iso.expected['g_in_u'] as number))).toBeLessThan(
      iso.tolerance as number,
    );
    expect(
      Math.abs(band / at('5').expandedUncertainty - (iso.expected['g_in_U_k2'] as number)),
    ).toBeLessThan(iso.tolerance as number);
    expect(['8.3', '8.4', '11.6', '11.7'].map((text) => at(text).complies)).toEqual([
      true,
      null,
      null,
      false,
    ]);
  });

  const b89 = checkValue('b89-n-to-1');
  it(`N:1: ${provenance(b89)}`, () => {
    const requirement: LimitRequirement<'length'> = {
      limits: { min: inches('0.500'), max: inches('0.501') },
      decisionRule: { kind: 'simple' },
      comparison: absolute,
      fitRatio: '4',
    };
    const found = assess(requirement, {
      value: inches('0.5005'),
      standardUncertainty: inMetres((b89.inputs['U_in'] as number) / 2),
      level: 0.954499736103642,
    });
    expect(found.ratio).toBeCloseTo(b89.expected['N'] as number, 6);
    expect(found.fit).toBe(true);
    expect(
      assess(
        { ...requirement, fitRatio: '4.001' },
        { value: inches('0.5005'), standardUncertainty: inMetres(0.0000625) },
      ).fit,
    ).toBe(true);
    expect(
      assess(
        { ...requirement, fitRatio: '4.2' },
        { value: inches('0.5005'), standardUncertainty: inMetres(0.0000625) },
      ).fit,
    ).toBe(false);
  });
});

describe('ASTM E29', () => {
  const e29 = checkValue('e29-table1');
  const limits: readonly {
    readonly max?: string;
    readonly min?: string;
    readonly decimals: number;
  }[] = (
    e29.inputs['rows'] as readonly {
      readonly limit: string;
      readonly kind: 'min' | 'max';
      readonly unit: string;
    }[]
  ).map(({ limit, kind, unit }) => ({
    [kind]: limit,
    decimals: -Math.round(Math.log10(Number(unit))),
  }));
  const cases = e29.expected['value,rounded,conforms'] as readonly (readonly [
    string,
    number,
    boolean,
  ])[];

  it.each(cases.map((row, i) => [...row, limits[Math.floor(i / 3)]] as const))(
    `rounding method: %s becomes %s, conforms %s; ${provenance(e29)}`,
    (text, rounded, conforms, limit) => {
      const { decimals = 0, ...ends } = limit ?? {};
      expect(toNumber(roundToDecimals(fromDecimalText(text), decimals, halfEven))).toBe(rounded);
      const found = assess(against(ends, { kind: 'simple' }, { method: 'rounded', decimals }), {
        value: number(text),
        standardUncertainty: 0,
      });
      expect(found.complies).toBe(conforms);
    },
  );

  it('absolute method: the note of the same check', () => {
    const simple = { kind: 'simple' } as const;
    const verdicts = [
      [{ min: '36000' }, '35950'],
      [{ min: '57' }, '56.6'],
      [{ max: '40' }, '40.4'],
      [{ max: '0.5' }, '0.54'],
    ] as const;
    for (const [ends, text] of verdicts)
      expect(
        assess(against(ends, simple), { value: number(text), standardUncertainty: 0 }).complies,
      ).toBe(false);
  });

  it('the rounded limit becomes the effective limit before the guard band', () => {
    const found = assess(
      against(
        { max: '40' },
        { kind: 'guarded-rejection', guardFactor: '0' },
        { method: 'rounded', decimals: 0 },
      ),
      { value: number('40.5'), standardUncertainty: 0.1 },
    );
    expect(found.acceptance?.max).toMatchObject({ text: '40.5', unit: '1' });
    expect(compareQuantities(found.acceptance?.max ?? number('0'), number('40.5'))).toBe(0);
    const guarded = assess(
      against({ max: '40' }, { kind: 'guarded-rejection' }, { method: 'rounded', decimals: 0 }),
      { value: number('40.6'), standardUncertainty: 0.1 },
    );
    expect(asciiIn(guarded.acceptance?.max ?? number('0'), '1', 4)).toBe('40.6645');
  });
});
