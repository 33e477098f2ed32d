import { getUnit } from '../quantity/find-unit';
import { findAs, plus, type Quantity, quantityOf } from '../quantity/quantity';
import { compare, fromDecimalText, mul, type Rational } from '../quantity/rational';
import type { Clause } from '../rulebook/clause';
import type { ClauseResult } from '../rulebook/clause-result';
import { decisionOf } from '../rulebook/evaluate/decision-of';
import { type Facts, findNumber } from '../rulebook/evaluate/facts';
import type { Figure } from '../rulebook/limit';
import type { QuantityName } from '../rulebook/quantity-catalogue';
import { type BoreOutside, type Remedy, remediesFor } from '../tappet/remedies';

type Length = Quantity<'length'>;

/** A remedy, and the clause that allows or forbids it. */
export interface RemedyInClass extends Remedy {
  /** Absent where no clause speaks of it: ask the officials before any work. */
  readonly clause?: string | undefined;
}

export interface BoreRemedies {
  readonly position: string;
  readonly remedies: readonly RemedyInClass[];
}

/** Nominal lifter body diameters in common use, in inches. Common practice. */
const NOMINAL_SIZES: readonly Length[] = ['0.842', '0.875', '0.904'].map((text) =>
  quantityOf('length', mul(fromDecimalText(text), getUnit('length', 'in').factor), 'in'),
);

type Allowed = Pick<RemedyInClass, 'allowed' | 'clause'>;
const UNSAID: Allowed = { allowed: null };

interface Class {
  readonly clauses: readonly Clause[];
  readonly results: readonly ClauseResult[];
}

const waived = ({ results }: Class, { number }: Clause): boolean =>
  results.some(({ clause, state }) => clause === number && state === 'waived');

/** By the mandatory clause on bushed bores. */
const bushing = (inClass: Class): Allowed => {
  for (const clause of inClass.clauses) {
    const { requirement: rule, force, number } = clause;
    if (force !== 'mandatory' || rule?.kind !== 'yes-no' || rule.subject !== 'bore-bushed')
      continue;
    return { allowed: rule.required === 'yes' || waived(inClass, clause), clause: number };
  }
  return UNSAID;
};

/** By the mandatory clause on the body's size: whether any size from–to lies within it. */
const bodyOf = (inClass: Class, from: Rational, to: Rational): Allowed => {
  for (const clause of inClass.clauses) {
    const { requirement: rule, force, number } = clause;
    if (force !== 'mandatory' || rule?.kind !== 'limit') continue;
    if (rule.quantity !== 'lifter-body-diameter') continue;
    const { min, max } = decisionOf(rule).limits;
    const within =
      (min === undefined || compare(to, min.value) >= 0) &&
      (max === undefined || compare(from, max.value) <= 0);
    return { allowed: within || waived(inClass, clause), clause: number };
  }
  return UNSAID;
};

const allowedBy = (inClass: Class, { kind, from, to, nominal }: Remedy): Allowed => {
  if (kind === 'bush-back') return bushing(inClass);
  if (kind === 'next-nominal-size')
    return nominal === undefined ? UNSAID : bodyOf(inClass, nominal.value, nominal.value);
  return from === null || to === null ? UNSAID : bodyOf(inClass, from.value, to.value);
};

type Sizes = Pick<BoreOutside, 'smallestBore' | 'largestBore' | 'smallestLifter' | 'largestLifter'>;

/** From clearance and lifter, so that a hot block's bore counts as it is at 20 °C. */
const sizesAt = (facts: Pick<Facts, 'numbers'>, position: string): Sizes | undefined => {
  const find = (quantity: QuantityName, figure: Figure) => {
    const fact = findNumber(facts, quantity, position, figure);
    return fact && findAs('length', fact.value);
  };
  const smallestLifter = find('lifter-body-diameter', 'smallest');
  const largestLifter = find('lifter-body-diameter', 'largest');
  const tightest = find('tappet-clearance', 'smallest');
  const loosest = find('tappet-clearance', 'largest');
  if (!smallestLifter || !largestLifter || !tightest || !loosest) return undefined;
  return {
    smallestLifter,
    largestLifter,
    smallestBore: plus(largestLifter, tightest),
    largestBore: plus(smallestLifter, loosest),
  };
};

const UNASKED = { anotherLifter: null, bush: null, nextSize: null } as const;

/**
 * For each bore outside the window of a clearance clause: what could be done, and whether the class
 * allows it. Advice. A bore whose lifter has no size is left out.
 */
export const remediesInClass = (
  clearance: Clause,
  inClass: Class,
  facts: Pick<Facts, 'numbers'>,
): readonly BoreRemedies[] => {
  const { number, requirement: rule } = clearance;
  if (rule?.kind !== 'limit' || rule.quantity !== 'tappet-clearance') return [];
  const { limits } = decisionOf(rule);
  const min = limits.min && findAs('length', limits.min);
  const max = limits.max && findAs('length', limits.max);
  const result = inClass.results.find(({ clause }) => clause === number);
  if (min === undefined || max === undefined || result === undefined) return [];
  return result.perPosition.flatMap(({ position, state }): readonly BoreRemedies[] => {
    const sizes = state === 'outside' ? sizesAt(facts, position) : undefined;
    if (sizes === undefined) return [];
    const bore = { ...sizes, min, max, nominalSizes: NOMINAL_SIZES, allowed: UNASKED };
    const remedies = remediesFor(bore).map((remedy) => ({
      ...remedy,
      ...allowedBy(inClass, remedy),
    }));
    return [{ position, remedies }];
  });
};
