import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  add,
  div,
  fromDecimalText,
  mul,
  type Rational,
  rational,
  sub,
  toNumber,
  zero,
} from '@/domain/quantity/rational';
import { oneWay } from '@/domain/statistics/one-way';
import { clopperPearson, wilson } from '@/domain/statistics/proportion';
import { blandAltman } from '@/domain/statistics/study/bland-altman';
import { crossedAnova } from '@/domain/statistics/study/crossed-anova';
import { iso5725 } from '@/domain/statistics/study/iso5725';
import { kappa } from '@/domain/statistics/study/kappa';
import { summary } from '@/domain/statistics/summary';

const decimal = fc
  .tuple(fc.integer({ min: -999_999, max: 999_999 }), fc.integer({ min: 0, max: 5 }))
  .map(([n, places]) => (n / 10 ** places).toFixed(places));
const series = fc.array(decimal, { minLength: 2, maxLength: 30 });
const groups = fc.array(fc.array(decimal, { minLength: 2, maxLength: 8 }), {
  minLength: 2,
  maxLength: 6,
});
const crossed = (cell: fc.Arbitrary<string>) =>
  fc
    .tuple(
      fc.integer({ min: 2, max: 3 }),
      fc.integer({ min: 2, max: 3 }),
      fc.integer({ min: 2, max: 5 }),
    )
    .chain(([a, t, p]) => {
      const row = fc.array(cell, { minLength: p, maxLength: p });
      const trials = fc.array(row, { minLength: t, maxLength: t });
      return fc.array(trials, { minLength: a, maxLength: a });
    });

// A second route, straight from the definitions in exact fractions: deviations from means, squared.
const total = (values: readonly Rational[]) => values.reduce(add, zero);
const meanOf = (values: readonly Rational[]) => div(total(values), rational(BigInt(values.length)));
const squares = (values: readonly Rational[], about: Rational) =>
  total(values.map((x) => mul(sub(x, about), sub(x, about))));
const exact = (texts: readonly string[]) => texts.map(fromDecimalText);
const close = (found: number, expected: number) =>
  found === expected || Math.abs(found - expected) <= 1e-13 * Math.abs(expected);

describe('studies agree with their definitions worked in exact fractions', () => {
  it('mean and standard deviation', () => {
    fc.assert(
      fc.property(series, (texts) => {
        const found = summary(texts);
        const values = exact(texts);
        const variance = div(squares(values, meanOf(values)), rational(BigInt(values.length - 1)));
        return (
          close(found.mean, toNumber(meanOf(values))) &&
          close(found.standardDeviation, Math.sqrt(toNumber(variance)))
        );
      }),
    );
  });

  it('sums of squares between and within ragged groups', () => {
    fc.assert(
      fc.property(groups, (texts) => {
        const found = oneWay(texts);
        const rows = texts.map(exact);
        const grand = meanOf(rows.flat());
        const within = total(rows.map((row) => squares(row, meanOf(row))));
        const between = total(
          rows.map((row) => mul(rational(BigInt(row.length)), squares([meanOf(row)], grand))),
        );
        return close(found.ssWithin, toNumber(within)) && close(found.ssBetween, toNumber(between));
      }),
    );
  });

  it('the repeatability of a crossed study is the scatter within its cells', () => {
    fc.assert(
      fc.property(crossed(decimal), (readings) => {
        const cells = readings.flatMap((trials) =>
          (trials[0] ?? []).map((_, part) => trials.map((row) => row[part] ?? '')),
        );
        const { sumsOfSquares: ss } = crossedAnova(readings);
        const parts = ss.part + ss.appraiser + ss.interaction + ss.repeatability;
        return (
          close(ss.repeatability, oneWay(cells).ssWithin) &&
          Math.abs(parts - ss.total) <= 1e-12 * ss.total
        );
      }),
    );
  });
});

describe('what must not matter does not', () => {
  it('order of the values: mean and scatter are the same to the last bit', () => {
    fc.assert(
      fc.property(series, (texts) => {
        const { lag1: _, ...found } = summary(texts);
        const { lag1: __, ...turned } = summary([...texts].reverse());
        expect(turned).toEqual(found);
      }),
    );
  });

  it('a large common offset changes neither F nor precision', () => {
    fc.assert(
      fc.property(
        fc.array(fc.array(fc.integer({ min: 0, max: 9 }), { minLength: 2, maxLength: 5 }), {
          minLength: 2,
          maxLength: 5,
        }),
        (rows) => {
          const plain = rows.map((row) => row.map((x) => `0.${x}`));
          const far = rows.map((row) => row.map((x) => `123456789012345.${x}`));
          expect(oneWay(far).F).toBe(oneWay(plain).F);
          expect(iso5725(far).reproducibilitySd).toBe(iso5725(plain).reproducibilitySd);
        },
      ),
    );
  });

  it('which of two methods comes first turns the bias and nothing else', () => {
    fc.assert(
      fc.property(
        fc.array(fc.tuple(decimal, decimal), { minLength: 2, maxLength: 20 }),
        (pairs) => {
          const [a, b] = [pairs.map(([x]) => x), pairs.map(([, y]) => y)];
          const [found, turned] = [blandAltman(a, b), blandAltman(b, a)];
          expect(turned.sd).toBe(found.sd);
          expect(turned.lower + found.upper).toBeCloseTo(0, 6);
        },
      ),
    );
  });

  it('which inspector stands in the rows of a kappa table', () => {
    const table = fc.integer({ min: 2, max: 4 }).chain((n) =>
      fc.array(fc.array(fc.nat(50), { minLength: n, maxLength: n }), {
        minLength: n,
        maxLength: n,
      }),
    );
    fc.assert(
      fc.property(table, (counts) => {
        fc.pre(counts.flat().some((count) => count > 0));
        const turned = counts.map((_, i) => counts.map((row) => row[i] ?? 0));
        const found = kappa(counts).kappa;
        expect(kappa(turned).kappa).toBe(found);
        if (found !== null) expect(found).toBeLessThanOrEqual(1);
      }),
    );
  });
});

describe('intervals of a proportion', () => {
  it('hold the proportion, stay between 0 and 1, and the exact one holds the score one’s centre', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 400 }), fc.nat(400), (n, k) => {
        const count = Math.min(k, n);
        const [score, sure] = [wilson(count, n), clopperPearson(count, n)];
        for (const { lower, upper } of [score, sure]) {
          expect(lower).toBeGreaterThanOrEqual(0);
          expect(upper).toBeLessThanOrEqual(1);
          expect(lower).toBeLessThanOrEqual(count / n);
          expect(upper).toBeGreaterThanOrEqual(count / n);
        }
        const centre = (score.lower + score.upper) / 2;
        expect(sure.lower).toBeLessThanOrEqual(centre);
        expect(sure.upper).toBeGreaterThanOrEqual(centre);
      }),
    );
  });
});
