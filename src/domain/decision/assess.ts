import type { Dimension } from '../quantity/dimension';
import { type Quantity, quantityOf } from '../quantity/quantity';
import { gridOf } from '../quantity/stored';
import { acceptanceWindow, complies, fourStates } from './complies';
import { decisionRuleFault } from './decision-rule';
import { effectiveLimits } from './effective-limits';
import { fitness } from './fitness';
import { guardBand } from './guard-band';
import { onGridOutward } from './on-grid-outward';
import { conformanceProbability } from './probability/conformance-probability';
import { coverageFactor, spreadOf } from './probability/coverage';
import type { Assessment, LimitRequirement, Limits, MeasuredValue } from './requirement';
import { ruleSentence } from './rule-sentence';
import { contains, reachesAnEnd, type Window } from './window';

/** Two-sided coverage of U when none is stated. */
export const DEFAULT_LEVEL = 0.95;

/**
 * Holds a measured value against a requirement. Everything is exact but U and the guard band, rounded
 * once, outward (`onGridOutward`). Throws a RangeError on a rule that `decisionRuleFault` refuses or a
 * requirement without a limit, a TypeError on mixed dimensions: callers check their input first.
 */
export const assess = <D extends Dimension>(
  requirement: LimitRequirement<D>,
  measured: MeasuredValue<NoInfer<D>>,
): Assessment<D> => {
  const { decisionRule: rule, comparison } = requirement;
  const { value: quantity, standardUncertainty: standard, level = DEFAULT_LEVEL } = measured;
  const limit = checkedLimit(requirement, quantity);
  const spread = spreadOf(measured.degreesOfFreedom);
  const k = coverageFactor(spread, level);
  const expanded = k * standard;
  const grid = gridOf(limit.dimension);
  const reach = onGridOutward(expanded, grid);
  const guard = onGridOutward(guardBand(rule, spread, { standard, expanded }), grid);
  const window = effectiveLimits(requirement.limits, comparison);
  const { value } = quantity;
  const { fit, ratio } = fitness(requirement, reach);
  const probability = conformanceProbability(window, value, standard, spread);
  const fourState = fourStates(window, value, reach);
  const ground = { window, value, guard, fit, fourState, conformanceProbability: probability };
  const close = reach.n > 0n && reachesAnEnd(window, value, reach);
  const accepted = acceptanceWindow(rule, window, guard);
  const acceptance = accepted && inLimitUnit(accepted, limit);
  return {
    assessment: close ? 'too-close' : contains(window, value) ? 'within' : 'outside',
    fit,
    complies: complies(rule, ground),
    conformanceProbability: probability,
    coverageFactor: k,
    expandedUncertainty: expanded,
    acceptance,
    fourState,
    ratio,
    distribution: spread.distribution,
    sentence: ruleSentence({ requirement, limit, window, accepted, guard, fit }),
  };
};

const checkedLimit = <D extends Dimension>(
  { limits, decisionRule, maximumUncertainty }: LimitRequirement<D>,
  value: Quantity<D>,
): Quantity<D> => {
  const fault = decisionRuleFault(decisionRule);
  if (fault !== undefined) throw new RangeError(fault);
  const limit = limits.max ?? limits.min;
  if (limit === undefined) throw new RangeError('A requirement has a min, a max, or both.');
  for (const other of [limits.min, value, maximumUncertainty])
    if (other !== undefined && !comparable(other.dimension, limit.dimension))
      throw new TypeError(`${other.dimension} is not compared with ${limit.dimension}.`);
  return limit;
};

const comparable = (a: Dimension, b: Dimension): boolean =>
  a === b || (a === 'temperature-difference' && b === 'temperature');

const inLimitUnit = <D extends Dimension>(window: Window, limit: Quantity<D>): Limits<D> => ({
  ...(window.low && { min: quantityOf(limit.dimension, window.low.at, limit.unit) }),
  ...(window.high && { max: quantityOf(limit.dimension, window.high.at, limit.unit) }),
});
