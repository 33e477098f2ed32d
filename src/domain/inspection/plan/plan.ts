import type { Clause } from '../../rulebook/clause';
import type { PositionResult } from '../../rulebook/clause-result';
import type { LimitRequirement } from '../../rulebook/limit';
import type { Per } from '../../rulebook/quantities/entry';
import { getQuantityEntry, type QuantityName } from '../../rulebook/quantity-catalogue';
import type { RulesInForce } from '../../rulebook/rules-in-force';
import type { InspectionAssessment } from '../assess-inspection';
import { positionKey } from '../capture/rows';
import { isNearLimit } from './near-limit';
import type { Extent } from './places';
import { askedFor, insteadOf } from './worked-out';

/** Why readings are asked at one place. */
export type Why = 'screening' | 'clause-asks-all' | 'near-limit' | 'advice';

/** One quantity to be read at one place, and how much of it. */
export interface Ask {
  readonly quantity: QuantityName;
  /** As facts and results name it: `5 intake`, a cylinder's number, `engine`. */
  readonly position: string;
  readonly extent: Extent;
  readonly why: Why;
  /** Number of the clause that asks. */
  readonly clause: string;
}

type Assessed = Pick<InspectionAssessment, 'findings' | 'judged' | 'facts'>;

const ORDER: readonly Why[] = ['advice', 'screening', 'near-limit', 'clause-asks-all'];

const rowsOf = (per: Per) => (per === 'lifter' ? 'bore' : per);

/** Form cannot be seen in one reading, and an extreme of one reading is no extreme. */
const asksAll = ({ quantity, figure }: LimitRequirement): boolean =>
  quantity === 'bore-out-of-round' ||
  quantity === 'bore-taper' ||
  figure === 'smallest' ||
  figure === 'largest';

const keysFor = (per: Per, { positions }: Assessed['facts']): readonly string[] => {
  if (per === 'engine' || per === 'car') return [per];
  return (per === 'cylinder' ? positions.cylinders : positions.bores).map(({ key }) => key);
};

/** The results that a reading at a place has a part in: its own, or the whole engine's. */
const resultsAt = (results: readonly PositionResult[], own: Per, key: string, per: Per) =>
  rowsOf(own) === rowsOf(per) ? results.filter((one) => one.position === key) : results;

const asksOf = (clause: Clause, rule: LimitRequirement, assessed: Assessed): readonly Ask[] => {
  const counting = assessed.judged.filter(
    ({ state, row }) => state === 'counts' && row.referencePart === undefined,
  );
  const results = assessed.findings.find((one) => one.clause === clause.number)?.perPosition ?? [];
  const isRead = (name: QuantityName) => counting.some(({ row }) => row.quantity === name);
  const instead = insteadOf(rule.quantity);
  const quantities = instead.some(isRead) ? instead : askedFor(rule.quantity);
  return quantities.flatMap((quantity): readonly Ask[] => {
    const { per } = getQuantityEntry(quantity);
    const keys = keysFor(per, assessed.facts);
    const read = new Set(
      counting
        .filter(({ row }) => row.quantity === quantity)
        .map(({ place }) => positionKey(place, rowsOf(per))),
    );
    const sampled =
      rule.sample.kind === 'all' || rowsOf(per) !== rowsOf(rule.per)
        ? keys
        : [...keys.filter((key) => read.has(key)), ...keys.filter((key) => !read.has(key))].slice(
            0,
            Math.max(rule.sample.count, read.size),
          );
    return keys
      .filter((key) => sampled.includes(key))
      .map((position): Ask => {
        const at = { quantity, position, clause: clause.number };
        if (asksAll(rule)) return { ...at, extent: 'full', why: 'clause-asks-all' };
        const near = resultsAt(results, rule.per, position, per).some((one) =>
          isNearLimit(clause, one),
        );
        if (near) return { ...at, extent: 'full', why: 'near-limit' };
        return { ...at, extent: 'one', why: clause.force === 'advisory' ? 'advice' : 'screening' };
      });
  });
};

/**
 * What is to be read, by the rules in force and what has been found so far: one reading a place first,
 * the full sheet only where a mandatory clause asks for it or a reading is near a limit. Advisory clauses
 * ask nothing unless `advice` is wanted. One ask for each quantity and place, the widest of all clauses.
 */
export const planOf = (
  rules: Pick<RulesInForce, 'clauses'>,
  assessed: Assessed,
  { advice }: { readonly advice: boolean },
): readonly Ask[] => {
  const widest = new Map<string, Ask>();
  for (const clause of rules.clauses) {
    const rule = clause.requirement;
    if (rule?.kind !== 'limit') continue;
    if (clause.force !== 'mandatory' && !(advice && clause.force === 'advisory')) continue;
    for (const ask of asksOf(clause, rule, assessed)) {
      const key = `${ask.quantity} ${ask.position}`;
      const before = widest.get(key);
      if (before === undefined || ORDER.indexOf(ask.why) > ORDER.indexOf(before.why))
        widest.set(key, ask);
    }
  }
  return [...widest.values()];
};

export const findAsk = (
  plan: readonly Ask[],
  quantity: QuantityName,
  position: string,
): Ask | undefined => plan.find((ask) => ask.quantity === quantity && ask.position === position);
