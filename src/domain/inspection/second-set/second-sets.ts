import type { Finding } from '../finding';
import { type Fact, factsOfSet, type SetResult } from '../measure/measure-position';
import { type Agreement, agreementsOf } from './agreement';
import type { SetChoice } from './choice';

/** A second set beside the first of the same bore. */
export interface SecondSet {
  readonly set: number;
  /** By whom each was taken; the same one alone: a re-zeroed repeat, and no second opinion. */
  readonly firstBy: readonly string[];
  readonly secondBy: readonly string[];
  readonly alone: boolean;
  readonly agreements: readonly Agreement[];
  readonly agree: boolean;
}

/** The readings of a set itself, without a lifter that it took over. */
export const ownReadings = ({ set }: SetResult) =>
  set.used.filter(({ row }) => row.set === set.set);

const takers = (result: SetResult): readonly string[] => [
  ...new Set(ownReadings(result).map(({ row }) => row.takenBy)),
];

/** Each further set of a bore beside its first. */
export const secondSetsOf = (sets: readonly SetResult[]): readonly SecondSet[] => {
  const [first, ...others] = sets;
  if (first === undefined) return [];
  return others.map((other): SecondSet => {
    const readIn = new Set(ownReadings(other).map(({ row }) => row.quantity));
    const agreements = agreementsOf(factsOfSet(first), factsOfSet(other), readIn);
    const firstBy = takers(first);
    const secondBy = takers(other);
    return {
      set: other.set.set,
      firstBy,
      secondBy,
      alone: secondBy.some((one) => firstBy.includes(one)),
      agreements,
      agree: agreements.every(({ agree }) => agree),
    };
  });
};

/** The facts of the sets that stand: all together unless a person chose one of them. */
export const standingFacts = (
  sets: readonly SetResult[],
  choice: SetChoice | undefined,
): readonly (readonly Fact[])[] => {
  const chosen = sets.filter(({ set }) => set.set === choice?.stands);
  return (chosen.length > 0 ? chosen : sets).map(factsOfSet);
};

/** Clauses that do not pool the sets of a bore but hold each by itself, by number. */
export const clausesHoldingEach = (
  findings: readonly Pick<Finding, 'clause' | 'perPosition'>[],
  bore: string,
): readonly string[] =>
  findings
    .filter(({ perPosition }) =>
      perPosition.some(({ position, sets }) => position === bore && sets !== undefined),
    )
    .map(({ clause }) => clause);
