import { describe, expect, it } from 'vitest';
import { spreadOf } from '@/domain/decision/probability/coverage';
import { budgetLines } from '@/domain/measurement/budget';
import { pooledRepeatability } from '@/domain/measurement/repeatability';
import { mean } from '@/domain/measurement/series';
import {
  combine,
  contribution,
  expand,
  ofDivision,
  rectangular,
  type UncertaintyComponent,
} from '@/domain/measurement/uncertainty';
import { fromDecimalText, toNumber } from '@/domain/quantity/rational';
import { checkValue, provenance } from '../../support/check-value';

const numbers = (values: unknown) =>
  (values as readonly number[]).map((value) => fromDecimalText(String(value)));

const component = (
  name: string,
  standardUncertainty: number,
  degreesOfFreedom: number | null,
  sensitivity = 1,
): UncertaintyComponent => ({
  name,
  standardUncertainty,
  degreesOfFreedom,
  sensitivity,
  words: name,
});

/** Within the tolerance that stands beside the published figure, by its name or for all. */
const near = (check: ReturnType<typeof checkValue>, name: string, found: number) => {
  const { tolerance } = check;
  const allowed =
    typeof tolerance === 'number' ? tolerance : (tolerance as Record<string, number>)[name];
  expect(
    Math.abs(found - (check.expected[name] as number)),
    `${name} is ${found}`,
  ).toBeLessThanOrEqual(allowed ?? 0);
};

describe('type A evaluation', () => {
  const readings = checkValue('gum-4.4.3');
  it(`mean, s, u and dof: ${provenance(readings)}`, () => {
    const values = numbers(readings.inputs['readings_C']);
    const found = pooledRepeatability([values]);
    near(readings, 'mean', toNumber(mean(values)));
    near(readings, 's', found?.standardDeviation ?? Number.NaN);
    near(readings, 'u', (found?.standardDeviation ?? Number.NaN) / Math.sqrt(values.length));
    expect(found?.degreesOfFreedom).toBe(readings.expected['dof']);
  });

  const days = checkValue('gum-H.5');
  it(`scatter of the day means: ${provenance(days)}`, () => {
    const means = numbers(days.inputs['day_means_V']);
    const found = pooledRepeatability([means]);
    const s = (found?.standardDeviation ?? Number.NaN) * 1e6;
    near(days, 'grand_mean', toNumber(mean(means)));
    near(days, 's_of_means_uV', s);
    near(days, 's_a_uV', s * Math.sqrt(days.inputs['K'] as number));
    near(days, 'u_mean_uV', s / Math.sqrt(days.inputs['J'] as number));
  });
});

describe('combining', () => {
  const powers = checkValue('gum-G.4.1');
  it(`effective degrees of freedom: ${provenance(powers)}`, () => {
    const [a = 0, b = 0, c = 0] = powers.inputs['u_rel_percent'] as readonly number[];
    const [m = 0, n = 0, o = 0] = powers.inputs['dof'] as readonly number[];
    const components = [component('a', a, m), component('b', b, n), component('c', c, o)];
    const found = combine(components);
    near(powers, 'uc_percent', found.standardUncertainty);
    // Unrounded: 18.9987, cut to 18 here; the GUM's 19 comes from u rounded to 1.03 first.
    expect(found.degreesOfFreedom).toBeCloseTo(18.998742, 6);
    near(
      powers,
      'veff_with_uc_rounded_1.03',
      (1.03 / found.standardUncertainty) ** 4 * (found.degreesOfFreedom ?? 0),
    );
    near(powers, 't95_19', spreadOf(19).quantile(0.975));
    const expanded = expand(found);
    expect(expanded).toMatchObject({ distribution: 't' });
    expect(expanded.coverageFactor).toBeCloseTo(2.1009, 4);
    near(powers, 'U95_percent', Number(expanded.expandedUncertainty.toFixed(1)));
  });

  const gauge = checkValue('gum-H.1');
  it(`an end gauge, line by line: ${provenance(gauge)}`, () => {
    const of = (name: string) => gauge.inputs[name] as number;
    const t95 = (dof: number) => spreadOf(dof).quantile(0.975);
    const reliability = (percent: number) => 0.5 / (percent / 100) ** 2;
    const lS = component('standard', of('U_cert_nm') / of('k_cert'), of('dof_cert'));
    const dbar = component(
      'repeats',
      of('s_pooled_nm') / Math.sqrt(of('n_mean')),
      of('dof_pooled'),
    );
    const d1 = component(
      'random',
      of('comparator_random_nm_95') / t95(of('comparator_random_dof')),
      of('comparator_random_dof'),
    );
    const d2 = component(
      'systematic',
      of('comparator_syst_3sigma_nm') / 3,
      reliability(of('comparator_syst_reliability_pct')),
    );
    near(gauge, 'u_ls', contribution(lS));
    near(gauge, 'u_dbar', contribution(dbar));
    near(gauge, 'u_d1', contribution(d1));
    near(gauge, 'u_d2', contribution(d2));
    const d = combine([dbar, d1, d2]);
    near(gauge, 'u_d', d.standardUncertainty);
    near(gauge, 'veff_d', d.degreesOfFreedom ?? 0);
    const theta = Math.hypot(of('u_theta_mean_C'), of('theta_cyclic_amp_C') / Math.SQRT2);
    near(gauge, 'u_theta_C', theta);
    const dAlpha = component(
      'δα',
      rectangular(of('dalpha_halfwidth')),
      reliability(of('dalpha_reliability_pct')),
      of('lS_nm') * of('theta_C'),
    );
    const dTheta = component(
      'δθ',
      rectangular(of('dtheta_halfwidth_C')),
      reliability(of('dtheta_reliability_pct')),
      of('lS_nm') * of('alphaS'),
    );
    near(gauge, 'contrib_dalpha', contribution(dAlpha));
    near(gauge, 'contrib_dtheta', contribution(dTheta));
    const all = combine([
      lS,
      component('d', d.standardUncertainty, d.degreesOfFreedom),
      dAlpha,
      dTheta,
    ]);
    near(gauge, 'uc2_nm2', all.standardUncertainty ** 2);
    near(gauge, 'uc_nm', Math.round(all.standardUncertainty));
    near(gauge, 'veff', all.degreesOfFreedom ?? 0);
    const { coverageFactor, expandedUncertainty } = expand(all, 0.99);
    near(gauge, 't99_16', coverageFactor);
    // Unrounded 92.47; the GUM's 93 is 2.92 × 32, both rounded first.
    expect(expandedUncertainty).toBeCloseTo(92.4666, 3);
    near(
      gauge,
      'U99_nm_from_rounded',
      Math.round(Number(coverageFactor.toFixed(2)) * Math.round(all.standardUncertainty)),
    );
    near(gauge, 'l_mm', (of('lS_nm') + of('d_nm')) / 1e6);
    // H.1.7: second-order terms of α and θ, which the first-order budget leaves out.
    const second = component(
      'second order',
      of('lS_nm') * rectangular(of('dalpha_halfwidth')) * theta,
      null,
    );
    const alphaTheta = component(
      'second order',
      of('lS_nm') * rectangular(of('alphaS_halfwidth')) * rectangular(of('dtheta_halfwidth_C')),
      null,
    );
    near(
      gauge,
      'uc_second_order_nm',
      Math.round(
        combine([component('first', all.standardUncertainty, null), second, alphaTheta])
          .standardUncertainty,
      ),
    );
  });

  const table = checkValue('gum-G.2-ttable');
  it(`coverage factors: ${provenance(table)}`, () => {
    const levels = [0.682689492137086, 0.9, 0.95, 0.954499736103642, 0.99, 0.99730020393674];
    for (const dof of table.inputs['dof'] as readonly number[]) {
      const row = table.expected[String(dof)] as readonly number[];
      levels.forEach((level, i) => {
        const { coverageFactor } = expand({ standardUncertainty: 1, degreesOfFreedom: dof }, level);
        expect(Math.abs(coverageFactor - (row[i] ?? 0)), `t(${dof}, ${level})`).toBeLessThan(
          table.tolerance as number,
        );
      });
    }
  });

  it('has no degrees of freedom where every part is taken as known', () => {
    expect(combine([component('a', 3, null), component('b', 4, null)])).toEqual({
      standardUncertainty: 5,
      degreesOfFreedom: null,
    });
    expect(combine([])).toEqual({ standardUncertainty: 0, degreesOfFreedom: null });
  });

  it('keeps its digits in metres as in micrometres', () => {
    const parts = (scale: number) =>
      combine([component('a', 3 * scale, 4), component('b', 4 * scale, 9)]);
    expect(parts(1e-9).degreesOfFreedom).toBeCloseTo(parts(1).degreesOfFreedom ?? 0, 9);
  });
});

describe('a budget in an inspector’s words', () => {
  it('is shown largest first, each line with its share of the variance', () => {
    const lines = budgetLines([
      { ...component('calibration', 0.5, null), words: 'the gauge’s calibration' },
      {
        ...component('division', ofDivision(2 * Math.sqrt(3) * 1.2), null),
        words: 'the dial’s division',
      },
      { ...component('repeatability', 1, 8), words: 'the hand’s repeatability' },
    ]);
    expect(lines.map((line) => line.sentence)).toEqual([
      'The dial’s division is half of it.',
      'The hand’s repeatability is a third of it.',
      'The gauge’s calibration is a tenth of it.',
    ]);
    expect(lines.reduce((sum, line) => sum + line.share, 0)).toBeCloseTo(1, 12);
  });
});
