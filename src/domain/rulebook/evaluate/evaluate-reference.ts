import { plus, type Quantity, quantityOf } from '../../quantity/quantity';
import { div, rational } from '../../quantity/rational';
import type { PositionResult } from '../clause-result';
import { writtenWords } from '../describe';
import type { ReferenceAverageRequirement } from '../limit';
import { getQuantityEntry, type RuleDimension } from '../quantity-catalogue';
import { around, decisionWithin } from './decision-of';
import { type Facts, findNumber, positionsFor, type ReferenceFact, wasOutOfReach } from './facts';
import { heldNumber, missingAt } from './held-number';

const meanOf = (
  first: ReferenceFact,
  others: readonly ReferenceFact[],
): Quantity<RuleDimension> => {
  const sum = others.reduce((total, part) => plus(total, part.value), first.value);
  const count = rational(BigInt(others.length + 1));
  return quantityOf(sum.dimension, div(sum.value, count), sum.unit);
};

/** u of (value − mean of n parts), the parts measured independently: JCGM 100:2008, 5.1.2. */
const combined = (standard: number, parts: readonly ReferenceFact[]): number =>
  Math.hypot(standard, ...parts.map((part) => part.standardUncertainty / parts.length));

/** Every position held against the mean of the reference parts. */
export const evaluateReference = (
  rule: ReferenceAverageRequirement,
  facts: Facts,
  advisory: boolean,
): readonly PositionResult[] => {
  const parts = facts.references.filter((part) => part.quantity === rule.quantity);
  const [first, ...others] = parts;
  const positions = positionsFor(rule.per, facts.positions);
  if (first === undefined || parts.length < rule.n) {
    return positions.map((position) => ({
      ...missingAt(position, false),
      sentence: `${position.label}: ${parts.length} of ${rule.n} reference parts measured; nothing to compare with yet.`,
    }));
  }
  const { dimension } = getQuantityEntry(rule.quantity);
  const decision = decisionWithin(rule, dimension, around(meanOf(first, others), rule));
  const limit = `within +${writtenWords(rule.plus)} −${writtenWords(rule.minus)} of the mean of ${parts.length} reference parts`;
  return positions.map((position) => {
    const fact = findNumber(facts, rule.quantity, position.key, rule.figure);
    if (fact === undefined)
      return missingAt(position, wasOutOfReach(facts, rule.quantity, position.key));
    return heldNumber({
      position,
      fact: { ...fact, standardUncertainty: combined(fact.standardUncertainty, parts) },
      compared: fact.value,
      decision,
      unit: rule.unit,
      figure: rule.figure,
      advisory,
      limit,
    });
  });
};
