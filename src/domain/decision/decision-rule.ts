import { fromDecimalText } from '../quantity/rational';

/** How wide the guard band is: a factor of U, or a one-sided probability (0.95 unless stated). Never both. */
export interface Guard {
  /** Decimal text, multiplies the expanded uncertainty U. */
  readonly guardFactor?: string | undefined;
  /** One-sided, in the open interval 0.5 to 1. */
  readonly probability?: number | undefined;
}

/**
 * - simple: the measured value against the limit, on the official instrument;
 * - guarded-acceptance: passes only when compliance is shown;
 * - guarded-rejection: fails only when a breach is shown;
 * - iso14253: each is stated only when shown at 95 %, else neither (ISO 14253-1:2017 default);
 * - conformance-probability: passes at this probability of lying within (JCGM 106:2012, 7 and 8);
 * - ilac-g8-four: the four statements of ILAC-G8:09/2019 with a guard band of U.
 */
export type DecisionRule =
  | { readonly kind: 'simple' }
  | ({ readonly kind: 'guarded-acceptance' } & Guard)
  | ({ readonly kind: 'guarded-rejection' } & Guard)
  | { readonly kind: 'iso14253' }
  | { readonly kind: 'conformance-probability'; readonly probability: number }
  | { readonly kind: 'ilac-g8-four' };

/** One-sided probability of a guard band when the clause states none. */
export const DEFAULT_PROBABILITY = 0.95;

/** The rule for a measured dimension with a penalty, when the clause states none. */
export const DEFAULT_RULE: DecisionRule = { kind: 'guarded-rejection' };

const DECIMAL = /^\d*\.?\d+$/;

/** What is wrong with the rule as stated, in plain words; `undefined` when nothing is. */
export const decisionRuleFault = (rule: DecisionRule): string | undefined => {
  if (rule.kind === 'simple' || rule.kind === 'iso14253' || rule.kind === 'ilac-g8-four')
    return undefined;
  const factor = 'guardFactor' in rule ? rule.guardFactor : undefined;
  if (factor !== undefined && rule.probability !== undefined)
    return 'State the guard band by a factor of U or by a probability, not by both.';
  if (factor !== undefined)
    return DECIMAL.test(factor) && fromDecimalText(factor).n >= 0n
      ? undefined
      : 'The guard factor is a decimal number of zero or more, such as 1 or 0.83.';
  const probability = rule.probability ?? DEFAULT_PROBABILITY;
  return probability > 0.5 && probability < 1
    ? undefined
    : 'The probability lies between 0.5 and 1, such as 0.95.';
};
