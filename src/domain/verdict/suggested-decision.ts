import type { RulesInForce } from '../rulebook/rules-in-force';
import { computedStatement, type StatedFinding } from './computed-statement';
import { type DecisionDraft, decidableClauses, penaltyRowsFor } from './decision';

/**
 * What a new decision's form is filled in with: the clauses whose findings fail, and the next step of
 * the row that they name. Where no clause names a row, or nothing was stated, that is left to choose.
 * The person decides either way.
 */
export const suggestedDecision = (
  rules: Pick<RulesInForce, 'clauses' | 'penalties'>,
  findings: readonly StatedFinding[],
  penalties: readonly { readonly row: string; readonly nextStep: number }[],
): Pick<DecisionDraft, 'clauses' | 'penalty'> & {
  readonly decision?: DecisionDraft['decision'];
} => {
  const computed = computedStatement(findings);
  if (computed === 'none') return { clauses: [], penalty: null };
  if (computed === 'pass') return { decision: 'no-breach', clauses: [], penalty: null };
  const clauses = decidableClauses(rules, findings).filter((number) =>
    findings.some(({ clause, pass }) => clause === number && pass === false),
  );
  const rows = penaltyRowsFor(rules, clauses);
  const named = rules.clauses.some(
    ({ number, penaltyRow }) => clauses.includes(number) && penaltyRow === rows[0]?.row,
  );
  const next = named ? penalties.find(({ row }) => row === rows[0]?.row) : undefined;
  return {
    decision: 'breach',
    clauses,
    penalty: next === undefined ? null : { row: next.row, step: next.nextStep },
  };
};
