import type { LimitRequirement as Decision, Limits } from '../../decision/requirement';
import type { Dimension, Written } from '../../quantity/dimension';
import { parseWritten } from '../../quantity/parse';
import { minus, plus, type Quantity, quantityOf } from '../../quantity/quantity';
import { down, halfEven, type Rounding, roundToStep, up } from '../../quantity/round';
import type { HeldAgainst, LimitRequirement, LimitRounding } from '../limit';
import type { RuleDimension } from '../quantities/entry';
import { getQuantityEntry } from '../quantity-catalogue';

/** A number of a published rule; a fault here is a defect, since none is published with one. */
export const getWritten = <D extends Dimension>(written: Written, dimension: D): Quantity<D> => {
  const parsed = parseWritten(written, dimension);
  if (parsed.ok) return parsed.value;
  throw new RangeError(`A rule in force holds "${written.text}": ${parsed.failure.detail}`);
};

const WAYS: Readonly<Record<LimitRounding['direction'], Rounding>> = {
  up,
  down,
  nearest: halfEven,
};

const rounded = <D extends Dimension>(
  quantity: Quantity<D>,
  { step, direction }: LimitRounding,
): Quantity<D> =>
  quantityOf(
    quantity.dimension,
    roundToStep(quantity.value, getWritten(step, quantity.dimension).value, WAYS[direction]),
    quantity.unit,
  );

/** `size − minus` and `size + plus`, exactly; the signs stand in the names. */
export const around = <D extends RuleDimension>(
  size: Quantity<D>,
  tolerance: { readonly plus: Written; readonly minus: Written },
): Limits<D> => ({
  min: minus(size, getWritten<D>(tolerance.minus, size.dimension)),
  max: plus(size, getWritten<D>(tolerance.plus, size.dimension)),
});

const limitsOf = (limit: LimitRequirement): Limits<RuleDimension> => {
  const { dimension } = getQuantityEntry(limit.quantity);
  const written: Limits<RuleDimension> =
    limit.nominal === undefined
      ? {
          min: limit.min && getWritten(limit.min, dimension),
          max: limit.max && getWritten(limit.max, dimension),
        }
      : around(getWritten(limit.nominal.size, dimension), limit.nominal);
  const rule = limit.rounding;
  if (rule?.of !== 'limit') return written;
  return {
    min: written.min && rounded(written.min, rule),
    max: written.max && rounded(written.max, rule),
  };
};

/** A rule with limits that only the measuring gives: about a reference mean, about a declared value. */
export const decisionWithin = (
  rule: HeldAgainst,
  dimension: RuleDimension,
  limits: Limits<RuleDimension>,
): Decision<RuleDimension> => ({
  limits,
  decisionRule: rule.decisionRule,
  comparison: rule.comparison,
  fitRatio: rule.fitRatio,
  maximumUncertainty: rule.maximumUncertainty && getWritten(rule.maximumUncertainty, dimension),
});

/** The requirement as the decision room assesses it. */
export const decisionOf = (limit: LimitRequirement): Decision<RuleDimension> =>
  decisionWithin(limit, getQuantityEntry(limit.quantity).dimension, limitsOf(limit));

/** The measured value as the rule rounds it, where it does. */
export const comparedValue = <D extends RuleDimension>(
  limit: LimitRequirement,
  value: Quantity<D>,
): Quantity<D> => (limit.rounding?.of === 'measured' ? rounded(value, limit.rounding) : value);
