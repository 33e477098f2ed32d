import { commonScale, quotient, scaledQuotient, unitsAt } from './decimal';

export interface Summary {
  readonly n: number;
  readonly mean: number;
  /** With n − 1 in the divisor. */
  readonly standardDeviation: number;
  /** Lag-1 autocorrelation; null when all values are equal. */
  readonly lag1: number | null;
}

/**
 * Mean, standard deviation and lag-1 autocorrelation of at least two decimal texts. Every sum is
 * exact, so the only roundings are the last division and root (definitions: NIST StRD, univariate).
 */
export function summary(values: readonly string[]): Summary {
  const n = values.length;
  if (n < 2) throw new RangeError('a summary needs two values or more');
  const scale = commonScale(values);
  const units = values.map((text) => unitsAt(text, scale));
  const count = BigInt(n);
  const total = units.reduce((sum, x) => sum + x, 0n);
  // n·x − Σx is a whole number: n times the deviation from the mean.
  const deviations = units.map((x) => count * x - total);
  let squares = 0n;
  let products = 0n;
  let previous = 0n;
  for (const deviation of deviations) {
    squares += deviation * deviation;
    products += deviation * previous;
    previous = deviation;
  }
  const variance = scaledQuotient(squares, count * count * (count - 1n), 2 * scale);
  return {
    n,
    mean: scaledQuotient(total, count, scale),
    standardDeviation: Math.sqrt(variance),
    lag1: squares === 0n ? null : quotient(products, squares),
  };
}
