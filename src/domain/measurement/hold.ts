import { combine, expand, type UncertaintyComponent } from './uncertainty';

/** `correct`: calculate to 20 °C and go on. `hold`: let the parts settle and measure again. `refuse`: no statement from these. */
export type TemperatureAdvice = 'correct' | 'hold' | 'refuse';

/**
 * What the limit can bear: the largest U with which a gauge is still fit (window ÷ (2 × fit ratio), or
 * the clause's largest allowed U), in the base.
 */
export const bearable = (window: number, fitRatio: number): number => window / (2 * fitRatio);

/**
 * Weighs temperature against what the limit can bear. A correction larger than that: hold the parts and
 * measure again. The correction's own U larger than that: temperature alone makes the measurement unfit.
 */
export const temperatureAdvice = (
  correction: number,
  components: readonly UncertaintyComponent[],
  bears: number,
): TemperatureAdvice => {
  if (expand(combine(components)).expandedUncertainty > bears) return 'refuse';
  return Math.abs(correction) > bears ? 'hold' : 'correct';
};
