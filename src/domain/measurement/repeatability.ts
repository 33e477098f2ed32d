import { toNumber } from '../quantity/rational';
import { overOne, type Series } from './series';

/** A standard deviation of single readings, in the base of the dimension. */
export interface Repeatability {
  readonly standardDeviation: number;
  readonly degreesOfFreedom: number;
}

/**
 * Pooled over groups of true repeats: readings of one place, gauge taken out and set again. Readings at
 * other depths and axes are form and belong to other groups. `null` where no group has two. The sum of
 * squares is exact, so neither order nor size of the values matters. JCGM 100:2008, 4.2.4 and H.3.
 */
export const pooledRepeatability = (groups: readonly Series[]): Repeatability | null => {
  let squares = 0;
  let degreesOfFreedom = 0;
  for (const group of groups) {
    if (group.length < 2) continue;
    squares += sumOfSquares(group);
    degreesOfFreedom += group.length - 1;
  }
  if (degreesOfFreedom === 0) return null;
  return { standardDeviation: Math.sqrt(squares / degreesOfFreedom), degreesOfFreedom };
};

/** About the mean: (n Σx² − (Σx)²) ÷ n, in whole numbers until the last step. */
const sumOfSquares = (group: Series): number => {
  const { tops, d } = overOne(group);
  const n = BigInt(group.length);
  const first = tops[0] ?? 0n;
  let sum = 0n;
  let square = 0n;
  for (const top of tops) {
    const from = top - first;
    sum += from;
    square += from * from;
  }
  return toNumber({ n: n * square - sum * sum, d: n * d * d });
};
