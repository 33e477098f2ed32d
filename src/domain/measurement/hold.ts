import { combine, expand, type UncertaintyComponent } from './uncertainty';

/** `correct`: calculate to 20 °C and go on. `hold`: let the parts settle and measure again. `refuse`: no statement from these. */
export type TemperatureAdvice = 'correct' | 'hold' | 'refuse';

/** Part of what the limit can bear from which parts are held and measured again. */
export const HOLD_FROM = 0.5;

/**
 * What the limit can bear: the largest U with which a gauge is still fit (window ÷ (2 × fit ratio), or
 * the clause's largest allowed U), in the base.
 */
export const bearable = (window: number, fitRatio: number): number => window / (2 * fitRatio);

/**
 * Weighs the temperature's own share of U against what the limit can bear. Above half of it: hold and
 * measure again; above all of it, temperature alone makes the measurement unfit.
 */
export const temperatureAdvice = (
  components: readonly UncertaintyComponent[],
  bears: number,
): TemperatureAdvice => {
  const { expandedUncertainty } = expand(combine(components));
  if (expandedUncertainty > bears) return 'refuse';
  return expandedUncertainty > HOLD_FROM * bears ? 'hold' : 'correct';
};
