import { type Rational, sub, toNumber } from '../../quantity/rational';
import { contains, type Window } from '../window';
import type { Spread } from './coverage';

/** P(low ≤ Y ≤ high) for Y about the measured value (JCGM 106:2012, 7.2 to 7.4); without uncertainty 0 or 1. */
export const conformanceProbability = (
  window: Window,
  value: Rational,
  standardUncertainty: number,
  spread: Spread,
): number => {
  if (standardUncertainty === 0) return contains(window, value) ? 1 : 0;
  const below = window.low && toNumber(sub(value, window.low.at)) / standardUncertainty;
  const above = window.high && toNumber(sub(window.high.at, value)) / standardUncertainty;
  if (below === undefined) return above === undefined ? 1 : spread.cdf(above);
  if (above === undefined) return spread.cdf(below);
  // Taken from the nearer tail, so that a small probability keeps its digits.
  return below < above
    ? spread.cdf(below) - spread.cdf(-above)
    : spread.cdf(above) - spread.cdf(-below);
};
