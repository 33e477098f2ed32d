import type { Clause } from '../../rulebook/clause';
import { type Facts, findAnswer, positionsFor, wasOutOfReach } from '../../rulebook/evaluate/facts';
import type { RulesInForce } from '../../rulebook/rules-in-force';

/** A check without a number at one place: a plug gauge offered, a yes or no, a choice, a match. */
export interface CheckAsk {
  readonly clause: Clause;
  readonly subject: string;
  readonly position: string;
  readonly answer: string | undefined;
}

const CHECKS: readonly string[] = ['choice', 'yes-no', 'plug-gauge', 'matches-paperwork'];

/** Whether a clause is checked without a gauge's number. */
export const isCheck = ({ requirement, force }: Clause): boolean =>
  requirement !== undefined && force !== 'text' && CHECKS.includes(requirement.kind);

/** Every check of the mandatory clauses, answered or not; places out of reach are left out. */
export const checkAsksOf = (
  rules: Pick<RulesInForce, 'clauses'>,
  facts: Facts,
): readonly CheckAsk[] =>
  rules.clauses.flatMap((clause): readonly CheckAsk[] => {
    const check = clause.requirement;
    if (!isCheck(clause) || clause.force !== 'mandatory' || check === undefined) return [];
    if (!('subject' in check) || !('per' in check)) return [];
    const { subject } = check;
    return positionsFor(check.per, facts.positions)
      .filter(({ key }) => !wasOutOfReach(facts, subject, key))
      .map(({ key }) => ({
        clause,
        subject,
        position: key,
        answer: findAnswer(facts, subject, key),
      }));
  });
