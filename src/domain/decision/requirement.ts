import type { Dimension } from '../quantity/dimension';
import type { Quantity } from '../quantity/quantity';
import type { DecisionRule } from './decision-rule';

/** At least one end; both ends belong to the window (a value equal to a limit is within). */
export interface Limits<D extends Dimension = Dimension> {
  readonly min?: Quantity<D> | undefined;
  readonly max?: Quantity<D> | undefined;
}

/**
 * How value and limit are compared (ASTM E29): the value as it is, or the value first rounded, half to
 * even, to so many decimals of the limit's unit (negative for tens and hundreds).
 */
export type Comparison =
  | { readonly method: 'absolute' }
  | { readonly method: 'rounded'; readonly decimals: number };

/** The checkable part of a clause on a measured or derived quantity. */
export interface LimitRequirement<D extends Dimension = Dimension> {
  readonly limits: Limits<D>;
  readonly decisionRule: DecisionRule;
  readonly comparison: Comparison;
  /** The smallest allowed window ÷ 2U, decimal text; "2" unless stated. */
  readonly fitRatio?: string | undefined;
  /** The largest allowed U: what makes a gauge fit where the limit is one-sided. */
  readonly maximumUncertainty?: Quantity | undefined;
}

export interface MeasuredValue<D extends Dimension = Dimension> {
  readonly value: Quantity<D>;
  /** In the base of the dimension (m, kg, K …). */
  readonly standardUncertainty: number;
  /** `null`, absent or infinite: known well enough for the normal distribution. */
  readonly degreesOfFreedom?: number | null | undefined;
  /** Two-sided coverage of U, 0.95 unless stated. */
  readonly level?: number | undefined;
}

export type FourState = 'pass' | 'conditional-pass' | 'conditional-fail' | 'fail';

/** Computed, never a verdict: a person decides. */
export interface Assessment<D extends Dimension = Dimension> {
  /** `too-close`: value ± U reaches a limit, whatever the rule. */
  readonly assessment: 'within' | 'outside' | 'too-close';
  /** Is the gauge fit for this rule? */
  readonly fit: boolean;
  /** By the decision rule; `null` where the rule makes no statement. */
  readonly complies: boolean | null;
  readonly conformanceProbability: number;
  readonly coverageFactor: number;
  /** U = k·u in the base of the dimension. */
  readonly expandedUncertainty: number;
  /** Where a value complies, in the limit's unit; `null` where no value does or the rule has no such interval. */
  readonly acceptance: Limits<D> | null;
  readonly fourState: FourState;
  /** Window ÷ 2U; `null` for a one-sided limit or no uncertainty. */
  readonly ratio: number | null;
  readonly distribution: 'normal' | 't';
  /** The rule in one plain sentence, to print on the finding. */
  readonly sentence: string;
}
