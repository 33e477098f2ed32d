import type { Clause } from '../clause';
import type { ClauseResult, PositionResult } from '../clause-result';
import { limitWords, requirementWords } from '../describe';
import type { Requirement } from '../requirement';
import type { Waiver } from '../ruling';
import { cautionsFor } from './cautions';
import { combine } from './combine';
import { evaluateAnswer, evaluateEvidence } from './evaluate-answer';
import { evaluateLimit } from './evaluate-limit';
import { evaluateMatch } from './evaluate-match';
import { evaluateReference } from './evaluate-reference';
import type { Facts } from './facts';

const ADVISORY = 'This clause is advisory: it warns and disqualifies nobody.';

const atPositions = (
  rule: Requirement,
  facts: Facts,
  advisory: boolean,
): readonly PositionResult[] => {
  switch (rule.kind) {
    case 'limit':
      return evaluateLimit(rule, facts, advisory);
    case 'reference-average':
      return evaluateReference(rule, facts, advisory);
    case 'matches-paperwork':
      return evaluateMatch(rule, facts, advisory);
    case 'choice':
    case 'yes-no':
    case 'plug-gauge':
    case 'seal':
      return evaluateAnswer(rule, facts, advisory);
    case 'photograph':
    case 'sheet':
      return evaluateEvidence(rule, facts);
  }
};

/**
 * Holds one clause against declared or measured facts. A waiver that covers this car or engine
 * leaves the numbers standing and makes no statement. It assesses; a person decides.
 */
export const evaluateClause = (clause: Clause, facts: Facts, waiver?: Waiver): ClauseResult => {
  const advisory = clause.force === 'advisory';
  const base = { clause: clause.number, heading: clause.heading, advisory };
  const rule = clause.requirement;
  if (rule === undefined || clause.force === 'judged' || clause.force === 'text') {
    const sentence =
      clause.force === 'text' ? 'Plain text; nothing to check.' : 'For the officials to judge.';
    return {
      ...base,
      state: 'judged',
      pass: null,
      fit: null,
      perPosition: [],
      sentence,
      cautions: [],
    };
  }
  const perPosition = atPositions(rule, facts, advisory);
  const combined = combine(perPosition);
  const limited = rule.kind === 'limit' || rule.kind === 'reference-average';
  const result: ClauseResult = {
    ...base,
    ...combined,
    perPosition,
    limit: rule.kind === 'limit' ? limitWords(rule) : limited ? requirementWords(rule) : undefined,
    sentence:
      advisory && warns(perPosition) ? `${combined.sentence} ${ADVISORY}` : combined.sentence,
    cautions: rule.kind === 'limit' ? cautionsFor(rule, perPosition, facts) : [],
  };
  if (waiver === undefined) return result;
  const sentence = `Waiver ${waiver.number}: ${waiver.words} (${combined.sentence})`;
  return { ...result, state: 'waived', pass: null, sentence };
};

const warns = (results: readonly PositionResult[]): boolean =>
  results.some((result) => result.state === 'outside' || result.state === 'does-not-comply');
