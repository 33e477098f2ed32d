import {
  compare,
  div,
  fromDecimalText,
  mul,
  type Rational,
  rational,
  sub,
  toNumber,
} from '../quantity/rational';
import type { LimitRequirement } from './requirement';

export const DEFAULT_FIT_RATIO = '2';

export interface Fitness {
  readonly fit: boolean;
  /** Window ÷ 2U as stated in the clause; `null` for a one-sided limit or no uncertainty. */
  readonly ratio: number | null;
}

/**
 * Is the gauge fit for this rule? The N:1 ratio of ASME B89.7.3.1 (window ÷ 2U) against the clause's
 * number, and U against the clause's largest allowed U where one is stated. A one-sided limit without
 * one sets no bar. Exact: U comes on the grid.
 */
export const fitness = (requirement: LimitRequirement, expanded: Rational): Fitness => {
  const { limits, fitRatio = DEFAULT_FIT_RATIO, maximumUncertainty } = requirement;
  const small =
    maximumUncertainty === undefined || compare(expanded, maximumUncertainty.value) <= 0;
  if (limits.min === undefined || limits.max === undefined || expanded.n === 0n)
    return { fit: small, ratio: null };
  const ratio = div(sub(limits.max.value, limits.min.value), mul(rational(2n), expanded));
  return {
    fit: small && compare(ratio, fromDecimalText(fitRatio)) >= 0,
    ratio: toNumber(ratio),
  };
};
