import { mean } from '../../measurement/series';
import { combine, type UncertaintyComponent } from '../../measurement/uncertainty';
import { type Quantity, quantityOf } from '../../quantity/quantity';
import type { PositionResult } from '../clause-result';
import { writtenWords } from '../describe';
import type { ReferenceAverageRequirement } from '../limit';
import type { RuleDimension } from '../quantities/entry';
import { getQuantityEntry } from '../quantity-catalogue';
import { around, decisionWithin } from './decision-of';
import {
  type Facts,
  findNumber,
  type NumberFact,
  positionsFor,
  type ReferenceFact,
  wasOutOfReach,
} from './facts';
import { heldNumber, missingAt } from './held-number';

const meanOf = (first: ReferenceFact, parts: readonly ReferenceFact[]): Quantity<RuleDimension> =>
  quantityOf(first.value.dimension, mean(parts.map((part) => part.value.value)), first.value.unit);

/** Of the value less the mean of n parts, all measured independently. */
const budgetOf = (
  fact: NumberFact,
  parts: readonly ReferenceFact[],
): readonly UncertaintyComponent[] => [
  {
    name: 'part',
    words: 'the part',
    standardUncertainty: fact.standardUncertainty,
    sensitivity: 1,
    degreesOfFreedom: fact.degreesOfFreedom ?? null,
  },
  ...parts.map((part) => ({
    name: `reference ${part.part}`,
    words: `reference part ${part.part}`,
    standardUncertainty: part.standardUncertainty,
    sensitivity: 1 / parts.length,
    degreesOfFreedom: null,
  })),
];

/** Every position held against the mean of the reference parts. */
export const evaluateReference = (
  rule: ReferenceAverageRequirement,
  facts: Facts,
  advisory: boolean,
): readonly PositionResult[] => {
  const parts = facts.references.filter((part) => part.quantity === rule.quantity);
  const [first] = parts;
  const positions = positionsFor(rule.per, facts.positions);
  if (first === undefined || parts.length < rule.n) {
    return positions.map((position) => ({
      ...missingAt(position, false),
      sentence: `${position.label}: ${parts.length} of ${rule.n} reference parts measured; nothing to compare with yet.`,
    }));
  }
  const { dimension } = getQuantityEntry(rule.quantity);
  const decision = decisionWithin(rule, dimension, around(meanOf(first, parts), rule));
  const limit = `within +${writtenWords(rule.plus)} −${writtenWords(rule.minus)} of the mean of ${parts.length} reference parts`;
  return positions.map((position) => {
    const fact = findNumber(facts, rule.quantity, position.key, rule.figure);
    if (fact === undefined)
      return missingAt(position, wasOutOfReach(facts, rule.quantity, position.key));
    const budget = budgetOf(fact, parts);
    return heldNumber({
      position,
      fact: { ...fact, ...combine(budget), budget },
      compared: fact.value,
      decision,
      ringCheck: rule.ringCheck,
      unit: rule.unit,
      figure: rule.figure,
      advisory,
      limit,
    });
  });
};
