import type { Clause } from '../rulebook/clause';
import type { ClauseResult } from '../rulebook/clause-result';
import { isQuantityName } from '../rulebook/quantity-catalogue';
import type { RulesInForce } from '../rulebook/rules-in-force';
import type { JudgedReading } from './capture/readings-that-count';
import { inTakingOrder, type RemarkRow } from './capture/rows';
import type { Finding } from './finding';
import { standsOn } from './plan/worked-out';

interface Behind {
  readonly rules: Pick<RulesInForce, 'clauses'>;
  readonly counting: readonly JudgedReading[];
  readonly remarks: readonly RemarkRow[];
}

/** What a clause is about: a quantity's name or a check's subject. */
const subjectOf = ({ requirement }: Clause): string => {
  if (requirement === undefined) return '';
  return 'quantity' in requirement ? requirement.quantity : requirement.subject;
};

/** Each result with the rows it stands on. A photograph belongs to a clause by its number or subject. */
export const withRows = (
  results: readonly ClauseResult[],
  { rules, counting, remarks }: Behind,
): readonly Finding[] => {
  const accepted = inTakingOrder(remarks).filter((row) => row.standing === 'accepted');
  return results.map((result): Finding => {
    const clause = rules.clauses.find((row) => row.number === result.clause);
    const subject = clause === undefined ? '' : subjectOf(clause);
    const quantities = isQuantityName(subject) ? standsOn(subject) : [];
    const readings = counting.filter(({ row }) => quantities.includes(row.quantity));
    return {
      ...result,
      readings: readings.map(({ row }) => row.id),
      checks: accepted
        .filter((row) => row.kind === 'check' && row.subject === subject && subject !== '')
        .map((row) => row.id),
      gauges: [...new Set(readings.map(({ row }) => row.gaugeId))],
      photographs: accepted
        .filter(
          (row) =>
            row.kind === 'photograph' && (row.subject === result.clause || row.subject === subject),
        )
        .map((row) => row.id),
    };
  });
};
