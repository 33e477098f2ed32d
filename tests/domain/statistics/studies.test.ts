import { describe, expect, it } from 'vitest';
import { normalCdf } from '@/domain/statistics/distribution';
import { fQuantile } from '@/domain/statistics/incomplete-beta';
import { oneWay } from '@/domain/statistics/one-way';
import { clopperPearson, wilson } from '@/domain/statistics/proportion';
import { averageRange } from '@/domain/statistics/study/average-range';
import { blandAltman } from '@/domain/statistics/study/bland-altman';
import { crossedAnova } from '@/domain/statistics/study/crossed-anova';
import { gaugeCapability, individualsChart } from '@/domain/statistics/study/gauge-stability';
import { iso5725 } from '@/domain/statistics/study/iso5725';
import { kappa } from '@/domain/statistics/study/kappa';
import { d2, d2Star, k1, kOfOneRange } from '@/domain/statistics/study/range-constants';
import { checkValue, provenance } from '../../support/check-value';

const near = (found: number, expected: number, tolerance: number): void => {
  expect(Math.abs(found - expected), `${found} against ${expected}`).toBeLessThanOrEqual(tolerance);
};

const texts = (values: readonly number[]) => values.map((x) => String(x));

const aiag = checkValue('aiag-avg-range');
const readings = Object.values(
  aiag.inputs['data[appraiser][trial][part]'] as Record<string, number[][]>,
).map((appraiser) => appraiser.map(texts));

describe('gauge repeatability and reproducibility', () => {
  it(`average and range (${provenance(aiag)})`, () => {
    const found = averageRange(readings);
    const expected = aiag.expected as Record<string, number> & { Rbar: number[]; pct: number[] };
    const tolerance = aiag.tolerance as Record<string, number>;
    for (const key of ['EV', 'AV', 'GRR', 'PV', 'TV', 'ndc'] as const) {
      near(found[key] ?? Number.NaN, expected[key] ?? Number.NaN, tolerance[key] ?? 0);
    }
    expected.Rbar.forEach((mean, i) => {
      near(found.meanRanges[i] ?? 0, mean, tolerance['Rbar'] ?? 0);
    });
    near(found.meanRange, expected['Rbarbar'] ?? 0, tolerance['Rbarbar'] ?? 0);
    near(found.appraiserDifference, expected['Xdiff'] ?? 0, tolerance['Xdiff'] ?? 0);
    near(found.partRange, expected['Rp'] ?? 0, tolerance['Rp'] ?? 0);
    [found.EV, found.AV, found.GRR, found.PV].forEach((sd, i) => {
      near((100 * sd) / found.TV, expected.pct[i] ?? 0, tolerance['pct'] ?? 0);
    });
  });

  const anova = checkValue('aiag-anova');
  it(`analysis of variance, interaction pooled (${provenance(anova)})`, () => {
    const found = crossedAnova(readings);
    const [part, appraiser, interaction, repeatability, total] = anova.expected['SS'] as number[];
    near(found.sumsOfSquares.part, part ?? 0, 0.0005);
    near(found.sumsOfSquares.appraiser, appraiser ?? 0, 0.0005);
    near(found.sumsOfSquares.interaction, interaction ?? 0, 0.0005);
    near(found.sumsOfSquares.repeatability, repeatability ?? 0, 0.0005);
    near(found.sumsOfSquares.total, total ?? 0, 0.0005);
    const sd = anova.expected['sd'] as Record<string, number>;
    near(found.EV, sd['repeat'] ?? 0, 2e-6);
    near(found.AV, sd['oper'] ?? 0, 2e-6);
    near(found.GRR, sd['grr'] ?? 0, 2e-6);
    near(found.PV, sd['part'] ?? 0, 2e-6);
    expect(found.ndc).toBe(anova.expected['ndc']);
    expect(found.pooled).toBe(true);
    near(found.interactionP ?? 0, 0.974106, 1e-6);
  });

  it('a constant offset in every reading changes no figure', () => {
    const moved = readings.map((a) => a.map((row) => row.map((x) => (Number(x) + 5).toFixed(2))));
    expect(crossedAnova(moved)).toEqual(crossedAnova(readings));
    expect(averageRange(moved)).toEqual(averageRange(readings));
  });

  it('a significant interaction is kept apart', () => {
    const crossing = [
      [
        ['1.0', '2.0'],
        ['1.1', '2.1'],
      ],
      [
        ['2.0', '1.0'],
        ['2.1', '1.1'],
      ],
    ];
    const found = crossedAnova(crossing);
    expect(found.pooled).toBe(false);
    // By hand: MS interaction 2, MS within 0.005, so (2 − 0.005)/2.
    expect(found.interactionSd ** 2).toBeCloseTo(0.9975, 12);
  });
});

describe('constants of the range', () => {
  const published = checkValue('d2-constants');
  it(`d2 (${provenance(published)})`, () => {
    (published.inputs['m'] as number[]).forEach((m, i) => {
      near(d2(m), (published.expected['d2'] as number[])[i] ?? 0, 0.0006);
    });
  });
  it('d2 is the integral that defines it (trapezoid rule)', () => {
    for (let m = 2; m <= 25; m += 1) {
      let area = 0;
      for (let x = -10; x <= 10; x += 0.01) {
        area += 0.01 * (1 - normalCdf(x) ** m - normalCdf(-x) ** m);
      }
      near(d2(m), area, 6e-6);
    }
  });
  const star = checkValue('d2star-g1');
  it(`d2* of one range (${provenance(star)})`, () => {
    (star.inputs['m'] as number[]).forEach((m, i) => {
      near(d2Star(m, 1), (star.expected['d2*'] as number[])[i] ?? 0, 0.0002);
    });
  });
  const k = checkValue('K-factors');
  it(`K1, K2, K3 (${provenance(k)})`, () => {
    near(k1(2, 30), k.expected['K1_2trials'] as number, 1e-4);
    near(k1(3, 30), k.expected['K1_3trials'] as number, 1e-4);
    near(kOfOneRange(2), k.expected['K2_2'] as number, 1e-4);
    near(kOfOneRange(3), k.expected['K2_3'] as number, 1e-4);
    near(kOfOneRange(10), k.expected['K3_10'] as number, 1e-4);
  });
});

describe('agreement of two methods', () => {
  const published = checkValue('bland-altman-pefr');
  const first = texts(published.inputs['wright1'] as number[]);
  const second = texts(published.inputs['mini1'] as number[]);

  it(`limits of agreement (${provenance(published)})`, () => {
    const found = blandAltman(first, second, 2);
    const e = published.expected as Record<string, number> & Record<string, number[]>;
    const pair = (key: string) => e[key] as unknown as readonly [number, number];
    near(found.bias, e['mean_diff'] as number, 0.05);
    near(found.sd, e['sd'] as number, 0.05);
    near(found.lower, pair('LoA(2sd)')[0], 0.12);
    near(found.upper, pair('LoA(2sd)')[1], 0.12);
    near(found.standardErrorOfBias, e['se_mean'] as number, 0.05);
    near(found.standardErrorOfLimits, e['se_limit'] as number, 0.05);
    found.biasInterval.forEach((x, i) => {
      near(x, pair('ci_mean')[i] ?? 0, 0.06);
    });
    found.lowerInterval.forEach((x, i) => {
      near(x, pair('ci_lower')[i] ?? 0, 0.2);
    });
    found.upperInterval.forEach((x, i) => {
      near(x, pair('ci_upper')[i] ?? 0, 0.2);
    });
  });

  it('the usual multiplier is 1.96 (full precision from the same data)', () => {
    const found = blandAltman(first, second);
    near(found.bias, -2.1176470588, 1e-9);
    near(found.sd, 38.7651298736, 1e-9);
    near(found.lower, -78.097302, 1e-6);
    near(found.upper, 73.862007, 1e-6);
  });
});

describe('counts', () => {
  const score = checkValue('wilson-small');
  (score.inputs['x,n'] as [number, number][]).forEach(([count, n], i) => {
    it(`Wilson's interval for ${count} of ${n} (${provenance(score)})`, () => {
      const [lower, upper] = (score.expected['ci'] as [number, number][])[i] ?? [0, 0];
      const found = wilson(count, n);
      near(found.lower, lower, 6e-5);
      near(found.upper, upper, 6e-5);
    });
  });

  const exact = checkValue('clopper-nist');
  it(`Clopper and Pearson's interval (${provenance(exact)})`, () => {
    const found = clopperPearson(4, 20, 0.9);
    near(found.lower, exact.expected['lower'] as number, 1.1e-6);
    near(found.upper, exact.expected['upper'] as number, 1.1e-6);
  });

  it("Cohen's kappa by hand: observed 0.7, expected 0.5, so 0.4 (constructed)", () => {
    expect(
      kappa([
        [20, 5],
        [10, 15],
      ]),
    ).toEqual({ kappa: 0.4, observed: 0.7, expected: 0.5 });
  });
  it('kappa has no value when chance alone agrees on everything', () => {
    expect(
      kappa([
        [9, 0],
        [0, 0],
      ]).kappa,
    ).toBeNull();
  });
});

describe('ISO 5725-2', () => {
  it('equal replicates, by hand: means 11, 14, 12; s_r² = 2/3, s_L² = 2 (constructed)', () => {
    // Within: Σ(x−x̄)² = 2·(1 + 0 + 0)… per laboratory 2, 0, 0 over 3 degrees of freedom.
    const found = iso5725([
      ['10', '12'],
      ['14', '14'],
      ['12', '12'],
    ]);
    expect(found.mean).toBeCloseTo(37 / 3, 14);
    expect(found.repeatabilitySd ** 2).toBeCloseTo(2 / 3, 14);
    // Means scatter by 7/3; less s_r²/2 = 1/3 leaves 2.
    expect(found.betweenLaboratorySd ** 2).toBeCloseTo(2, 13);
    expect(found.reproducibilitySd ** 2).toBeCloseTo(8 / 3, 13);
  });

  it('unequal replicates agree with the formulas of 7.4 worked by a second route (constructed)', () => {
    const data = [['5.0', '5.2', '5.1'], ['5.6', '5.4'], ['4.9', '5.1', '5.3', '4.7'], ['5.5']];
    const numbers = data.map((row) => row.map(Number));
    const n = numbers.map((row) => row.length);
    const N = n.reduce((a, x) => a + x, 0);
    const means = numbers.map((row) => row.reduce((a, x) => a + x, 0) / row.length);
    const mean = numbers.flat().reduce((a, x) => a + x, 0) / N;
    const sr2 =
      numbers
        .flatMap((row, i) => row.map((x) => (x - (means[i] ?? 0)) ** 2))
        .reduce((a, x) => a + x, 0) /
      (N - data.length);
    const sd2 = means.reduce((a, x, i) => a + (n[i] ?? 0) * (x - mean) ** 2, 0) / (data.length - 1);
    const nn = (N - n.reduce((a, x) => a + x * x, 0) / N) / (data.length - 1);
    const found = iso5725(data);
    expect(found.mean).toBeCloseTo(mean, 12);
    expect(found.repeatabilitySd).toBeCloseTo(Math.sqrt(sr2), 12);
    expect(found.reproducibilitySd).toBeCloseTo(Math.sqrt(sr2 + (sd2 - sr2) / nn), 12);
  });

  it('laboratories closer than their own scatter give no negative variance', () => {
    const found = iso5725([
      ['1', '3'],
      ['1', '3'],
      ['3', '1'],
    ]);
    expect(found.betweenLaboratorySd).toBe(0);
    expect(found.reproducibilitySd).toBe(found.repeatabilitySd);
  });
});

describe('repeatability between days', () => {
  const gum = checkValue('gum-H.5');
  it(`F and its quantiles (${provenance(gum)})`, () => {
    near(fQuantile(0.95, 9, 40), gum.expected['F95_9_40'] as number, 0.005);
    near(fQuantile(0.975, 9, 40), gum.expected['F975_9_40'] as number, 0.005);
  });
  it('groups that do not scatter within themselves have no F', () => {
    expect(
      oneWay([
        ['1', '1'],
        ['2', '2'],
      ]),
    ).toMatchObject({ F: null, p: null, ssWithin: 0 });
  });
});

describe('a gauge over time', () => {
  const chart = checkValue('flowrate-imr');
  it(`individuals chart (${provenance(chart)})`, () => {
    const found = individualsChart(texts(chart.inputs['x'] as number[]));
    near(found.mean, chart.expected['mean'] as number, 0.0006);
    near(found.meanMovingRange, chart.expected['MRbar'] as number, 0.0006);
    near(found.upperLimit, chart.expected['UCL'] as number, 0.0006);
    near(found.lowerLimit, chart.expected['LCL'] as number, 0.0006);
  });
  const capability = checkValue('cg-cgk-constructed');
  it(`Cg and Cgk (${provenance(capability)})`, () => {
    const { T_in, s_in, mean_in, ref_in } = capability.inputs as Record<string, number>;
    const found = gaugeCapability(T_in ?? 0, s_in ?? 0, (mean_in ?? 0) - (ref_in ?? 0));
    near(found.Cg, capability.expected['Cg'] as number, 1e-6);
    near(found.Cgk, capability.expected['Cgk'] as number, 1e-6);
  });
});
