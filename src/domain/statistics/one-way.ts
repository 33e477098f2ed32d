import { commonDivisor } from '../quantity/rational';
import { commonScale, quotient, scaledQuotient, unitsAt } from './decimal';
import { fTail } from './incomplete-beta';

export interface OneWay {
  readonly n: number;
  readonly mean: number;
  readonly dfBetween: number;
  readonly dfWithin: number;
  readonly ssBetween: number;
  readonly ssWithin: number;
  readonly msBetween: number;
  readonly msWithin: number;
  /** null when the groups do not scatter within themselves. */
  readonly F: number | null;
  /** Probability of an F as large if the groups do not differ. */
  readonly p: number | null;
}

/**
 * One-way analysis of variance of decimal texts; groups may differ in size. At least two groups,
 * each with a value, and more values than groups. Sums of squares are formed as exact fractions
 * before they become doubles, so a large common offset costs no digit.
 */
export function oneWay(groups: readonly (readonly string[])[]): OneWay {
  const n = groups.reduce((sum, group) => sum + group.length, 0);
  if (groups.length < 2 || n <= groups.length || groups.some((group) => group.length === 0)) {
    throw new RangeError('one-way analysis needs two groups or more and a repeat in one of them');
  }
  const scale = commonScale(groups.flat());
  // Σ T²/n over the groups as one fraction numerator/denominator.
  let numerator = 0n;
  let denominator = 1n;
  let total = 0n;
  let squares = 0n;
  for (const group of groups) {
    const units = group.map((text) => unitsAt(text, scale));
    const sum = units.reduce((a, x) => a + x, 0n);
    squares += units.reduce((a, x) => a + x * x, 0n);
    total += sum;
    const size = BigInt(units.length);
    const common = (denominator / commonDivisor(denominator, size)) * size;
    numerator = numerator * (common / denominator) + sum * sum * (common / size);
    denominator = common;
  }
  const all = BigInt(n);
  const between = numerator * all - total * total * denominator;
  const within = squares * denominator - numerator;
  const dfBetween = groups.length - 1;
  const dfWithin = n - groups.length;
  const F =
    within === 0n ? null : quotient(between * BigInt(dfWithin), within * all * BigInt(dfBetween));
  return {
    n,
    mean: scaledQuotient(total, all, scale),
    dfBetween,
    dfWithin,
    ssBetween: scaledQuotient(between, denominator * all, 2 * scale),
    ssWithin: scaledQuotient(within, denominator, 2 * scale),
    msBetween: scaledQuotient(between, denominator * all * BigInt(dfBetween), 2 * scale),
    msWithin: scaledQuotient(within, denominator * BigInt(dfWithin), 2 * scale),
    F,
    p: F === null ? null : fTail(F, dfBetween, dfWithin),
  };
}
