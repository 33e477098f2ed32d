import { commonDivisor, max, min, type Rational, sub } from '../quantity/rational';

/** At least one value; an empty series is a defect and throws. */
export type Series = readonly Rational[];

/** The values as whole numbers over one denominator, so that sums stay cheap and exact. */
export const overOne = (
  series: Series,
): { readonly tops: readonly bigint[]; readonly d: bigint } => {
  let d = 1n;
  for (const value of series) if (d % value.d !== 0n) d = (d / commonDivisor(d, value.d)) * value.d;
  return { tops: series.map((value) => value.n * (d / value.d)), d };
};

/** Exact, and so the same in whatever order the values come; not always in lowest terms. */
export const mean = (series: Series): Rational => {
  const { tops, d } = overOne(series);
  return { n: tops.reduce((sum, top) => sum + top, 0n), d: d * BigInt(series.length) };
};

export const smallest = (series: Series): Rational => series.reduce(min);
export const largest = (series: Series): Rational => series.reduce(max);
export const range = (series: Series): Rational => sub(largest(series), smallest(series));
