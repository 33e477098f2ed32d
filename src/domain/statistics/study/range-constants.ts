/**
 * Mean (d2) and standard deviation (d3) of the range of m = 2 … 25 normal values in units of σ:
 * d2 = ∫(1 − Φ^m − (1 − Φ)^m), to five figures; d2 for m = 2 … 5 is printed in AIAG MSA, Appendix C.
 */
const D2 = [
  1.12838, 1.69257, 2.05875, 2.32593, 2.53441, 2.70436, 2.8472, 2.97003, 3.07751, 3.17287, 3.25846,
  3.33598, 3.40676, 3.47183, 3.53198, 3.58788, 3.64006, 3.68896, 3.73495, 3.77834, 3.81938, 3.85832,
  3.89535, 3.93063,
];
const D3 = [
  0.8525, 0.88837, 0.87981, 0.86408, 0.84804, 0.83321, 0.81983, 0.80783, 0.79705, 0.78731, 0.77848,
  0.77042, 0.76303, 0.75621, 0.74991, 0.74405, 0.73859, 0.73348, 0.72869, 0.72418, 0.71992, 0.71589,
  0.71207, 0.70844,
];

export const LARGEST_SUBGROUP = 25;

const at = (table: readonly number[], m: number): number => {
  const value = table[m - 2];
  if (value === undefined) throw new RangeError(`no range constant for ${m} values`);
  return value;
};

/** The mean range of m normal values, in σ. */
export const d2 = (m: number): number => at(D2, m);

/** The constant that makes the mean of g ranges estimate σ: d2*² = d2² + d3²/g (AIAG MSA, Appendix C). */
export const d2Star = (m: number, g: number): number =>
  Math.hypot(at(D2, m), at(D3, m) / Math.sqrt(g));

/** The form prints its factors with four decimals, and its report is computed with them. */
const asPrinted = (factor: number): number => Math.round(factor * 1e4) / 1e4;

/** K1 = 1/d2* of the repeats; with more than 15 ranges the form takes d2 (AIAG MSA 4th ed., ch. III). */
export const k1 = (trials: number, ranges: number): number =>
  asPrinted(1 / (ranges > 15 ? d2(trials) : d2Star(trials, ranges)));

/** K2 (appraisers) and K3 (parts): 1/d2* of one range over `count` averages. */
export const kOfOneRange = (count: number): number => asPrinted(1 / d2Star(count, 1));
