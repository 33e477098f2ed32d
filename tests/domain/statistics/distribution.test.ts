import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  normalCdf,
  normalQuantile,
  studentCdf,
  studentQuantile,
} from '@/domain/statistics/distribution';
import { checkValue, provenance } from '../../support/check-value';

describe('the normal distribution', () => {
  const published = checkValue('normal-quantiles');
  const z = published.expected['z'] as number[];
  it.each((published.inputs['p'] as number[]).map((p, i) => [p, z[i] as number]))(
    `quantile at %d is %d (${provenance(published)})`,
    (p, expected) => {
      expect(Math.abs(normalQuantile(p) - expected)).toBeLessThan(published.tolerance as number);
      expect(Math.abs(normalCdf(expected) - p)).toBeLessThan(1e-14);
    },
  );

  it('keeps its relative accuracy in the tail (Φ(−6), Φ(−10) computed to 40 digits)', () => {
    expect(normalCdf(-6) / 9.865876450376981e-10 - 1).toBeCloseTo(0, 12);
    expect(normalCdf(-10) / 7.619853024160527e-24 - 1).toBeCloseTo(0, 12);
  });

  it('has its ends and its middle', () => {
    expect(normalQuantile(0.5)).toBe(0);
    expect(normalQuantile(0)).toBe(Number.NEGATIVE_INFINITY);
    expect(normalQuantile(1)).toBe(Number.POSITIVE_INFINITY);
    expect(normalQuantile(1.1)).toBeNaN();
  });
});

describe("Student's distribution", () => {
  const published = checkValue('t-quantiles');
  const t = published.expected['t'] as number[];
  const full = JSON.parse(published.note ?? '') as number[];
  it.each(
    (published.inputs['nu'] as number[]).map((nu, i) => [nu, t[i] as number, full[i] as number]),
  )(
    `0.975 quantile, %d degrees of freedom, is %d (${provenance(published)})`,
    (nu, printed, digits) => {
      const found = studentQuantile(0.975, nu);
      expect(Math.abs(found - printed)).toBeLessThan(published.tolerance as number);
      expect(Math.abs(found - digits)).toBeLessThan(1e-9);
    },
  );

  const gum = checkValue('gum-G.2-ttable');
  // 68.27, 95.45 and 99.73 stand for the exact normal coverages of 1, 2 and 3 σ.
  const coverage: Record<number, number> = { 68.27: 1, 95.45: 2, 99.73: 3 };
  const exact = (percent: number) => {
    const sigma = coverage[percent];
    return sigma === undefined ? percent / 100 : 1 - 2 * normalCdf(-sigma);
  };
  for (const [dof, row] of Object.entries(gum.expected as Record<string, number[]>)) {
    it(`Table G.2, ${dof} degrees of freedom (JCGM 100:2008 Table G.2, in part from memory)`, () => {
      (gum.inputs['p_percent'] as number[]).forEach((percent, i) => {
        const quantile = studentQuantile((1 + exact(percent)) / 2, Number(dof));
        expect(Math.abs(quantile - (row[i] as number))).toBeLessThan(gum.tolerance as number);
      });
    });
  }

  it('agrees with its closed forms at 1 and 2 degrees of freedom', () => {
    for (const p of [1e-9, 0.001, 0.2, 0.6, 0.975, 0.9995]) {
      const one = -1 / Math.tan(Math.PI * p);
      const two = (2 * p - 1) / Math.sqrt(2 * p * (1 - p));
      expect(studentQuantile(p, 1) / one - 1).toBeCloseTo(0, 9);
      expect(studentQuantile(p, 2) / two - 1).toBeCloseTo(0, 9);
    }
  });

  it('is the normal distribution for infinite degrees of freedom, and joins it smoothly', () => {
    expect(studentQuantile(0.95, Number.POSITIVE_INFINITY)).toBe(normalQuantile(0.95));
    expect(studentCdf(2, 99_999.9999)).toBeCloseTo(studentCdf(2, 100_000.0001), 12);
  });

  it('turns a quantile back into its probability, fractional degrees of freedom included', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1e-6, max: 1 - 1e-6, noNaN: true }),
        fc.double({ min: 0.3, max: 1e7, noNaN: true }),
        (p, dof) => Math.abs(studentCdf(studentQuantile(p, dof), dof) - p) < 1e-12,
      ),
    );
  });
});
