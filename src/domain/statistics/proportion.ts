import { normalQuantile } from './distribution';
import { betaQuantile } from './incomplete-beta';

export interface Interval {
  readonly lower: number;
  readonly upper: number;
}

/** Wilson's score interval (1927) for `count` of `n` at the two-sided `level`; its ends are exact at 0 and n. */
export function wilson(count: number, n: number, level = 0.95): Interval {
  const z = normalQuantile((1 + level) / 2);
  const share = count / n;
  const centre = share + z ** 2 / (2 * n);
  const half = z * Math.sqrt((share * (1 - share)) / n + z ** 2 / (4 * n * n));
  const scale = 1 + z ** 2 / n;
  return {
    lower: count === 0 ? 0 : (centre - half) / scale,
    upper: count === n ? 1 : (centre + half) / scale,
  };
}

/** The exact interval of Clopper and Pearson (1934) for `count` of `n` at the two-sided `level`. */
export function clopperPearson(count: number, n: number, level = 0.95): Interval {
  const alpha = (1 - level) / 2;
  return {
    lower: count === 0 ? 0 : betaQuantile(alpha, count, n - count + 1),
    upper: count === n ? 1 : betaQuantile(1 - alpha, count + 1, n - count),
  };
}
