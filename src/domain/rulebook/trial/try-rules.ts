import type { ClauseResult } from '../clause-result';
import { type Bearer, evaluateRules } from '../evaluate/evaluate-rules';
import type { Facts } from '../evaluate/facts';
import type { RulesInForce } from '../rules-in-force';

/** An engine's accepted paperwork, or what was found on it. */
export interface PastCase {
  readonly id: string;
  readonly name: string;
  readonly bearer: Bearer;
  readonly facts: Facts;
}

export interface FailedCase {
  readonly id: string;
  readonly name: string;
  readonly results: readonly ClauseResult[];
}

export interface Trial {
  readonly tried: number;
  /** Cases that fail a clause which they did not fail before. */
  readonly failed: readonly FailedCase[];
  readonly sentence: string;
}

type Rules = Pick<RulesInForce, 'clauses' | 'waivers'>;

/**
 * Holds past cases against rules that are not in force yet. With the rules as they are (`before`),
 * only what the change does is listed; without, everything that fails.
 */
export const tryRules = (
  after: Rules,
  cases: readonly PastCase[],
  before: Rules = { clauses: [], waivers: [] },
): Trial => {
  const failed = cases.flatMap(({ id, name, bearer, facts }): readonly FailedCase[] => {
    const already = new Set(
      evaluateRules(before, facts, bearer)
        .filter((result) => result.pass === false)
        .map((result) => result.clause),
    );
    const results = evaluateRules(after, facts, bearer).filter(
      (result) => result.pass === false && !already.has(result.clause),
    );
    return results.length === 0 ? [] : [{ id, name, results }];
  });
  const engines = cases.length === 1 ? 'engine' : 'engines';
  return {
    tried: cases.length,
    failed,
    sentence: `This would fail ${failed.length} of ${cases.length} ${engines}.`,
  };
};
