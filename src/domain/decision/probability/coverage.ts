import {
  normalCdf,
  normalQuantile,
  studentCdf,
  studentQuantile,
} from '../../statistics/distribution';

/** The distribution of a measured value about its estimate. */
export interface Spread {
  readonly distribution: 'normal' | 't';
  readonly quantile: (probability: number) => number;
  readonly cdf: (x: number) => number;
}

// The quantiles nearly every decision asks for: U at 95 % and a one-sided guard band at 95 %.
const USUAL = new Map([0.95, 0.975].map((p) => [p, normalQuantile(p)]));

const NORMAL: Spread = {
  distribution: 'normal',
  quantile: (probability) => USUAL.get(probability) ?? normalQuantile(probability),
  cdf: normalCdf,
};

/**
 * Student's t for finite degrees of freedom, cut to the next lower whole number as JCGM 100:2008 G.4.1
 * allows and its example H.1 does; normal otherwise.
 */
export const spreadOf = (degreesOfFreedom: number | null | undefined): Spread => {
  if (degreesOfFreedom === null || degreesOfFreedom === undefined) return NORMAL;
  if (degreesOfFreedom === Number.POSITIVE_INFINITY) return NORMAL;
  const dof = degreesOfFreedom < 1 ? degreesOfFreedom : Math.floor(degreesOfFreedom);
  return {
    distribution: 't',
    quantile: (probability) => studentQuantile(probability, dof),
    cdf: (x) => studentCdf(x, dof),
  };
};

/** k so that ± k standard uncertainties cover the two-sided level. */
export const coverageFactor = (spread: Spread, level: number): number =>
  spread.quantile((1 + level) / 2);
