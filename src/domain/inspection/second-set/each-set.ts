import type { NumberFact } from '../../rulebook/evaluate/facts';
import { readingsFor } from '../../rulebook/quantity-catalogue';
import { type Fact, factsOfSet, type SetResult } from '../measure/measure-position';
import { ownReadings } from './second-sets';

/** The sets that read something of their own for a quantity, each with its facts. */
const ownFacts = (results: readonly SetResult[]) =>
  results.map((result) => {
    const read = new Set(ownReadings(result).map(({ row }) => row.quantity));
    const facts = factsOfSet(result).filter(({ quantity }) =>
      readingsFor(quantity).some((name) => read.has(name)),
    );
    return { set: result.set.set, facts };
  });

const numberOf = (set: number, fact: Fact) => ({
  set,
  value: fact.value,
  standardUncertainty: fact.standardUncertainty,
  degreesOfFreedom: fact.degreesOfFreedom,
  budget: fact.budget,
});

/**
 * Numbers with what each independent set gave for them by itself, where there are two or more. A set
 * that took over the lifter of an earlier one gave nothing for the lifter.
 */
export const withSets = (
  numbers: readonly NumberFact[],
  results: readonly SetResult[],
): readonly NumberFact[] => {
  if (results.length < 2) return numbers;
  const own = ownFacts(results);
  return numbers.map((number): NumberFact => {
    const sets = own.flatMap(({ set, facts }) =>
      facts
        .filter((fact) => fact.quantity === number.quantity && fact.figure === number.figure)
        .map((fact) => numberOf(set, fact)),
    );
    return sets.length < 2 ? number : { ...number, sets };
  });
};
