import type { Rational } from '../quantity/rational';
import type { DecisionRule } from './decision-rule';
import type { FourState } from './requirement';
import { contains, isEmpty, narrowed, type Window, widened } from './window';

export interface Ground {
  readonly window: Window;
  readonly value: Rational;
  /** On the grid. */
  readonly guard: Rational;
  readonly fit: boolean;
  readonly fourState: FourState;
  readonly conformanceProbability: number;
}

/**
 * What the rule states, `null` where it states nothing.
 *
 * An unfit gauge has a wide guard band, and under guarded rejection nearly every value would pass by
 * it: such a pass says nothing, so there is none. A breach shown with it is still shown, since all of
 * its uncertainty is in the band; it stands, and the sentence says to confirm it. Under guarded
 * acceptance an unfit gauge can only make passing harder, so its pass is sound.
 */
export const complies = (rule: DecisionRule, ground: Ground): boolean | null => {
  const { window, value, guard, fit, fourState } = ground;
  switch (rule.kind) {
    case 'simple':
      return contains(window, value);
    case 'guarded-acceptance':
      return contains(narrowed(window, guard), value);
    case 'guarded-rejection':
      return contains(widened(window, guard), value) ? (fit ? true : null) : false;
    case 'iso14253':
      if (contains(narrowed(window, guard), value)) return true;
      return contains(widened(window, guard), value) ? null : false;
    case 'conformance-probability':
      return ground.conformanceProbability >= rule.probability;
    case 'ilac-g8-four':
      return fourState === 'pass' ? true : fourState === 'fail' ? false : null;
  }
};

/** The interval of complying values; `null` where there is none, or where the rule is no interval. */
export const acceptanceWindow = (
  rule: DecisionRule,
  window: Window,
  guard: Rational,
): Window | null => {
  if (rule.kind === 'simple') return window;
  if (rule.kind === 'guarded-rejection') return widened(window, guard);
  const twoSided = window.low !== undefined && window.high !== undefined;
  if (rule.kind === 'conformance-probability' && twoSided) return null;
  const accepted = narrowed(window, guard);
  return isEmpty(accepted) ? null : accepted;
};

/** ILAC-G8:09/2019, 4.2.3: pass and fail when all of value ± U lies on one side, else conditional. */
export const fourStates = (window: Window, value: Rational, expanded: Rational): FourState => {
  if (contains(window, value))
    return contains(narrowed(window, expanded), value) ? 'pass' : 'conditional-pass';
  return contains(widened(window, expanded), value) ? 'conditional-fail' : 'fail';
};
