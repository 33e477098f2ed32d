import { coverageFactor, spreadOf } from '../decision/probability/coverage';

/** One line of an uncertainty budget. */
export interface UncertaintyComponent {
  readonly name: string;
  /** Of the input, in any unit; the sensitivity takes it to the result's. */
  readonly standardUncertainty: number;
  readonly sensitivity: number;
  /** `null`: known well enough to be taken as infinite. */
  readonly degreesOfFreedom: number | null;
  /** In an inspector's words, to begin a sentence: "the dial's division". */
  readonly words: string;
}

export interface Combined {
  readonly standardUncertainty: number;
  /** Welch–Satterthwaite; `null` where every part is taken as infinite. Never cut to a whole number here. */
  readonly degreesOfFreedom: number | null;
}

/** What a component adds to the result: |c|·u. */
export const contribution = (component: UncertaintyComponent): number =>
  Math.abs(component.sensitivity * component.standardUncertainty);

/** Uncorrelated components in quadrature (JCGM 100:2008, 5.1.2) with effective degrees of freedom (G.4.1). */
export const combine = (components: readonly UncertaintyComponent[]): Combined => {
  const parts = components.map(contribution);
  const largest = Math.max(0, ...parts);
  if (largest === 0) return { standardUncertainty: 0, degreesOfFreedom: null };
  // Scaled by the largest, so that fourth powers of micrometres in metres do not vanish.
  let variance = 0;
  let divisor = 0;
  components.forEach(({ degreesOfFreedom }, i) => {
    const square = ((parts[i] ?? 0) / largest) ** 2;
    variance += square;
    if (degreesOfFreedom !== null) divisor += square ** 2 / degreesOfFreedom;
  });
  return {
    standardUncertainty: largest * Math.sqrt(variance),
    degreesOfFreedom: divisor === 0 ? null : variance ** 2 / divisor,
  };
};

export interface Expanded {
  readonly coverageFactor: number;
  readonly expandedUncertainty: number;
  readonly distribution: 'normal' | 't';
}

/** U = k·u for a two-sided level, with the t-quantile where degrees of freedom are finite (JCGM 100:2008, G.3). */
export const expand = (
  { standardUncertainty, degreesOfFreedom }: Combined,
  level = 0.95,
): Expanded => {
  const spread = spreadOf(degreesOfFreedom);
  const k = coverageFactor(spread, level);
  return {
    coverageFactor: k,
    expandedUncertainty: k * standardUncertainty,
    distribution: spread.distribution,
  };
};

/** Half-width of a rectangular distribution to its standard uncertainty (JCGM 100:2008, 4.3.7). */
export const rectangular = (halfWidth: number): number => halfWidth / Math.sqrt(3);

/** A scale read to whole divisions: rectangular, half a division to each side (JCGM 100:2008, F.2.2.1). */
export const ofDivision = (division: number): number => rectangular(division / 2);
