import type { Written } from '../quantity/dimension';
import type { Figure } from './limit';

/**
 * What stands at one position, or over a whole clause.
 * `no-statement`: there are numbers, but the gauge is not fit for this rule.
 * `judged`: nothing here can be computed; the officials judge.
 */
export type State =
  | 'within'
  | 'outside'
  | 'too-close'
  | 'not-measured'
  | 'could-not-be-reached'
  | 'no-statement'
  | 'complies'
  | 'does-not-comply'
  | 'judged'
  | 'waived';

/** One source of the uncertainty: words that stand alone, and its part of the variance in whole percent. */
export interface BudgetWords {
  readonly words: string;
  readonly share: string;
}

/** What one of several independent sets came to by itself. */
export interface SetWords {
  readonly set: string;
  readonly state: State;
  readonly value?: Written | undefined;
  readonly exact?: Written | undefined;
  readonly uncertainty?: Written | undefined;
}

export interface PositionResult {
  /** `engine`, a cylinder's number, or a bore's key from the position map. */
  readonly position: string;
  readonly state: State;
  /** The finding by the decision rule; `null` where there is none. Advisory results never say `false`. */
  readonly pass: boolean | null;
  /** Whether the gauge is fit for this rule; `null` where nothing was measured. */
  readonly fit: boolean | null;
  readonly figure?: Figure | undefined;
  /** The value compared, to the places worth reading; `exact` in full (ten places where endless). */
  readonly value?: Written | undefined;
  readonly exact?: Written | undefined;
  /** Expanded uncertainty U of that figure. */
  readonly uncertainty?: Written | undefined;
  /** Coverage factor k of U, to two decimals; with U, or not at all. */
  readonly coverageFactor?: string | undefined;
  /** What U is made of, the largest first; with U, where the budget is known. */
  readonly budget?: readonly BudgetWords[] | undefined;
  /** Width of the guard band where the rule has one. */
  readonly guardBand?: Written | undefined;
  /** Checks of the gauge on a ring that night, each in words. */
  readonly checked?: readonly string[] | undefined;
  /** Where the clause holds each set by itself and there are two or more. */
  readonly sets?: readonly SetWords[] | undefined;
  /** What its clause wants before more is stated: a second independent set, or one more as two differ. */
  readonly wants?: 'second-set' | 'new-set' | undefined;
  /** A choice or yes / no as declared or found. */
  readonly answer?: string | undefined;
  readonly sentence: string;
  /** The decision rule with its numbers, in one plain sentence. */
  readonly rule?: string | undefined;
}

/** One clause held against declared or measured facts. It assesses; a person decides. */
export interface ClauseResult {
  readonly clause: string;
  readonly heading: string;
  readonly state: State;
  readonly pass: boolean | null;
  readonly fit: boolean | null;
  readonly advisory: boolean;
  readonly perPosition: readonly PositionResult[];
  /** The limit in words: `at least 0.0013 in and at most 0.0019 in`. */
  readonly limit?: string | undefined;
  readonly sentence: string;
  readonly cautions: readonly string[];
}
