import { fromDecimalText, toNumber } from '../quantity/rational';
import { DEFAULT_PROBABILITY, type DecisionRule } from './decision-rule';
import type { Spread } from './probability/coverage';

/** Standard uncertainty u and expanded uncertainty U = k·u, in the base of the dimension. */
interface Uncertainty {
  readonly standard: number;
  readonly expanded: number;
}

/**
 * The width of the guard band, in the base: a factor of U, or the one-sided quantile of u (JCGM
 * 106:2012, 8.3). ISO 14253-1:2017 is the latter at 95 %; ILAC-G8:09/2019's four statements use U.
 */
export const guardBand = (rule: DecisionRule, spread: Spread, u: Uncertainty): number => {
  switch (rule.kind) {
    case 'simple':
      return 0;
    case 'ilac-g8-four':
      return u.expanded;
    case 'iso14253':
      return spread.quantile(DEFAULT_PROBABILITY) * u.standard;
    case 'conformance-probability':
      return spread.quantile(rule.probability) * u.standard;
    default:
      return rule.guardFactor === undefined
        ? spread.quantile(rule.probability ?? DEFAULT_PROBABILITY) * u.standard
        : toNumber(fromDecimalText(rule.guardFactor)) * u.expanded;
  }
};
