import { commonScale, unitsAt } from '../decimal';
import { studentQuantile } from '../distribution';
import { summary } from '../summary';

export interface Agreement {
  /** Mean of a − b. */
  readonly bias: number;
  readonly sd: number;
  readonly multiplier: number;
  /** Limits of agreement: bias ∓ multiplier × sd. */
  readonly lower: number;
  readonly upper: number;
  readonly standardErrorOfBias: number;
  readonly standardErrorOfLimits: number;
  /** 95 % intervals by Student's t with n − 1 degrees of freedom. */
  readonly biasInterval: readonly [number, number];
  readonly lowerInterval: readonly [number, number];
  readonly upperInterval: readonly [number, number];
}

/** The limits that hold about 95 % of differences; the 1986 paper's printed example rounds it to 2. */
export const USUAL_MULTIPLIER = 1.96;

/**
 * Agreement of two methods on the same items (Bland & Altman, Lancet 1986;i:307–310). The standard
 * error of a limit is √(3 s²/n), the paper's approximation. Same length, two pairs or more.
 */
export function blandAltman(
  a: readonly string[],
  b: readonly string[],
  multiplier = USUAL_MULTIPLIER,
): Agreement {
  if (a.length !== b.length) throw new RangeError('agreement needs pairs');
  const scale = commonScale([...a, ...b]);
  const differences = a.map((text, i) => unitsAt(text, scale) - unitsAt(b[i] ?? '', scale));
  const { n, mean, standardDeviation: sd } = summary(differences.map((d) => `${d}e-${scale}`));
  const lower = mean - multiplier * sd;
  const upper = mean + multiplier * sd;
  const standardErrorOfBias = sd / Math.sqrt(n);
  const standardErrorOfLimits = sd * Math.sqrt(3 / n);
  const t = studentQuantile(0.975, n - 1);
  const around = (centre: number, error: number) =>
    [centre - t * error, centre + t * error] as const;
  return {
    bias: mean,
    sd,
    multiplier,
    lower,
    upper,
    standardErrorOfBias,
    standardErrorOfLimits,
    biasInterval: around(mean, standardErrorOfBias),
    lowerInterval: around(lower, standardErrorOfLimits),
    upperInterval: around(upper, standardErrorOfLimits),
  };
}
