import type { ClauseResult } from '../clause-result';
import type { RulesInForce } from '../rules-in-force';
import type { Waiver } from '../ruling';
import { evaluateClause } from './evaluate-clause';
import type { Facts } from './facts';

/** Whose facts these are: waivers name a car or an engine. */
export interface Bearer {
  readonly carNumber?: string | undefined;
  readonly engineId?: string | undefined;
}

export const findWaiver = (
  waivers: readonly Waiver[],
  clause: string,
  bearer: Bearer,
): Waiver | undefined =>
  waivers.find(
    (waiver) =>
      waiver.clause === clause &&
      (waiver.for.kind === 'car'
        ? waiver.for.carNumber === bearer.carNumber
        : waiver.for.engineId === bearer.engineId),
  );

/** Every clause but plain text, in the rulebook's order. */
export const evaluateRules = (
  rules: Pick<RulesInForce, 'clauses' | 'waivers'>,
  facts: Facts,
  bearer: Bearer,
): readonly ClauseResult[] =>
  rules.clauses
    .filter((clause) => clause.force !== 'text')
    .map((clause) =>
      evaluateClause(clause, facts, findWaiver(rules.waivers, clause.number, bearer)),
    );
