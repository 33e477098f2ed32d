import type { DecisionRule } from '../decision/decision-rule';
import type { Comparison } from '../decision/requirement';
import type { Written } from '../quantity/dimension';
import type { Per } from './quantities/entry';
import type { QuantityName } from './quantity-catalogue';

/** Which figure of the readings at one position is held against the limit. */
export type Figure = 'mean' | 'smallest' | 'largest';

/** Permitted from `size` − `minus` to `size` + `plus`. */
export interface Nominal {
  readonly size: Written;
  readonly plus: Written;
  readonly minus: Written;
}

/** "Rounded up" helps one side or the other: a rule says what is rounded, how, and to which step. */
export interface LimitRounding {
  readonly of: 'limit' | 'measured';
  readonly direction: 'up' | 'down' | 'nearest';
  readonly step: Written;
}

export type CheckingLifter = 'solid' | 'as-fitted';

/** What is measured and where, shared by every requirement on a number. */
export interface Measurand {
  readonly quantity: QuantityName;
  /** The unit in which results are stated. */
  readonly unit: string;
  readonly per: Per;
  readonly figure?: Figure | undefined;
  /** Where the quantity is measured, `at the pushrod`. */
  readonly datum?: string | undefined;
  /** Lash at which a lift or timing is taken. */
  readonly lash?: Written | undefined;
  readonly checkingLifter?: CheckingLifter | undefined;
}

/** How a measured value is held against its limit. */
export interface HeldAgainst {
  readonly decisionRule: DecisionRule;
  readonly comparison: Comparison;
  /** The smallest allowed window ÷ 2U as decimal text. */
  readonly fitRatio?: string | undefined;
  readonly maximumUncertainty?: Written | undefined;
  /**
   * A gauge past its due day counts all the same where it was checked on the series' ring that night
   * and was off by no more than this. Left out: no check makes up for a calibration.
   */
  readonly ringCheck?: Written | undefined;
}

/** All positions, or a stated number of them. */
export type Sample = { readonly kind: 'all' } | { readonly kind: 'some'; readonly count: number };

/**
 * A limit on a measured or derived quantity: `min`, `max` or both, or else a nominal with its
 * tolerance. Bounds belong to the permitted window.
 */
export interface LimitRequirement extends Measurand, HeldAgainst {
  readonly kind: 'limit';
  readonly min?: Written | undefined;
  readonly max?: Written | undefined;
  readonly nominal?: Nominal | undefined;
  readonly sample: Sample;
  readonly rounding?: LimitRounding | undefined;
  /**
   * `each`: independent sets are not pooled. A breach is stated only when two or more sets each show it by
   * themselves; sets that differ by more than their joint U give no statement. Left out: they are pooled.
   */
  readonly twoSets?: 'each' | undefined;
}

/** The value must lie from − `minus` to + `plus` about the mean of at least `n` reference parts. */
export interface ReferenceAverageRequirement extends Measurand, HeldAgainst {
  readonly kind: 'reference-average';
  readonly n: number;
  readonly plus: Written;
  readonly minus: Written;
}
