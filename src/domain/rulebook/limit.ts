import type { Written } from '../quantity/dimension.ts';
import type { Per, QuantityName } from './quantity-catalogue.ts';

/** Which figure of the readings at one position is held against the limit. */
export type Figure = 'mean' | 'smallest' | 'largest';

export type Nominal = {
  readonly size: Written;
  readonly plus: Written;
  readonly minus: Written;
};

/** "Rounded up" helps one side or the other: a rule says what is rounded, how, and to which step. */
export interface LimitRounding {
  readonly of: 'limit' | 'measured';
  readonly direction: 'up' | 'down' | 'nearest';
  readonly step: Written;
}

export type CheckingLifter = 'solid' | 'as-fitted';

/**
 * A limit on a measured or derived quantity: `min`, `max` or both, or a nominal with its
 * tolerance; bounds belong to the permitted zone.
 */
export interface LimitRequirement {
  readonly kind: 'limit';
  readonly quantity: QuantityName;
  readonly unit: string;
  readonly per: Per;
  readonly min?: Written | undefined;
  readonly max?: Written | undefined;
  readonly nominal?: Nominal | undefined;
  readonly figure?: Figure | undefined;
  /** Where the quantity is measured, `at the pushrod`. */
  readonly datum?: string | undefined;
  /** Lash at which a lift or timing is taken. */
  readonly lash?: Written | undefined;
  readonly checkingLifter?: CheckingLifter | undefined;
  /** All positions, or a stated number of them. */
  readonly sample: { readonly kind: 'all' } | { readonly kind: 'some'; readonly count: number };
  readonly decision: DecisionClause;
  readonly rounding?: LimitRounding | undefined;
}

/** How a measured value is held against the limit, as the rule words it. */
export interface DecisionClause {
  /** Who has the benefit of the doubt inside the guard band; see the decision room. */
  readonly rule: DecisionRuleName;
  /** A gauge serves when U is at most this part of the permitted zone's width, `1/4`. */
  readonly fitRatio?: string | undefined;
  readonly maximumUncertainty?: Written | undefined;
}

export type DecisionRuleName = 'simple' | 'benefit-to-competitor' | 'benefit-to-rule';

/** The measured value must lie within ± `tolerance` of the mean of at least `n` reference parts. */
export interface ReferenceAverageRequirement {
  readonly kind: 'reference-average';
  readonly quantity: QuantityName;
  readonly unit: string;
  readonly per: Per;
  readonly n: number;
  readonly plus: Written;
  readonly minus: Written;
  readonly figure?: Figure | undefined;
  readonly datum?: string | undefined;
  readonly lash?: Written | undefined;
  readonly checkingLifter?: CheckingLifter | undefined;
  readonly decision: DecisionClause;
}
