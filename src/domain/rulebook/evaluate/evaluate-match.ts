import type { PositionResult } from '../clause-result';
import { writtenWords } from '../describe';
import type { HeldAgainst } from '../limit';
import { getQuantityEntry, isQuantityName, type QuantityName } from '../quantity-catalogue';
import type { MatchesPaperworkRequirement } from '../requirement';
import { decisionWithin } from './decision-of';
import {
  type Facts,
  findAnswer,
  findNumber,
  type Position,
  positionsFor,
  wasOutOfReach,
} from './facts';
import { heldNumber, missingAt } from './held-number';

// A difference beyond the uncertainty is a difference; a window of no width has no fitness number.
const BEYOND_UNCERTAINTY: HeldAgainst = {
  decisionRule: { kind: 'guarded-rejection', guardFactor: '1' },
  comparison: { method: 'absolute' },
  fitRatio: '0',
};

const alike = (text: string): string => text.trim().replace(/\s+/g, ' ').toLowerCase();

/** An answer for the whole engine serves every place that has none of its own. */
const answerAt = (facts: Facts, subject: string, { key }: Position): string | undefined =>
  findAnswer(facts, subject, key) ?? findAnswer(facts, subject, 'engine');

const answerMatches = (
  subject: string,
  facts: Facts,
  position: Position,
  advisory: boolean,
): PositionResult => {
  const found = answerAt(facts, subject, position);
  if (found === undefined) return missingAt(position, wasOutOfReach(facts, subject, position.key));
  const base = { position: position.key, fit: null, answer: found };
  const words = `${position.label}: “${found}”`;
  if (facts.origin === 'declared')
    return { ...base, state: 'complies', pass: true, sentence: `${words} is declared.` };
  const declared =
    facts.declared === undefined ? undefined : answerAt(facts.declared, subject, position);
  if (declared === undefined)
    return {
      ...base,
      state: 'judged',
      pass: null,
      sentence: `${words} found; nothing was declared.`,
    };
  const same = alike(found) === alike(declared);
  return {
    ...base,
    state: same ? 'complies' : 'does-not-comply',
    pass: same ? true : advisory ? null : false,
    sentence: same ? `${words} found, as declared.` : `${words} found; “${declared}” was declared.`,
  };
};

const numberMatches = (
  quantity: QuantityName,
  facts: Facts,
  position: Position,
  advisory: boolean,
): PositionResult => {
  const fact =
    findNumber(facts, quantity, position.key, undefined) ??
    (facts.origin === 'declared' ? findNumber(facts, quantity, 'engine', undefined) : undefined);
  if (fact === undefined) return missingAt(position, wasOutOfReach(facts, quantity, position.key));
  const words = `${position.label}: ${writtenWords(fact.value)}`;
  if (facts.origin === 'declared')
    return {
      position: position.key,
      state: 'complies',
      pass: true,
      fit: null,
      sentence: `${words} is declared.`,
    };
  const declared =
    facts.declared &&
    (findNumber(facts.declared, quantity, position.key, fact.figure) ??
      findNumber(facts.declared, quantity, 'engine', fact.figure));
  if (declared === undefined)
    return {
      position: position.key,
      state: 'judged',
      pass: null,
      fit: null,
      sentence: `${words} found; nothing was declared.`,
    };
  const { dimension, unit } = getQuantityEntry(quantity);
  const limits = { min: declared.value, max: declared.value };
  return heldNumber({
    position,
    fact,
    compared: fact.value,
    decision: decisionWithin(BEYOND_UNCERTAINTY, dimension, limits),
    unit,
    figure: fact.figure,
    advisory,
    limit: `${writtenWords(declared.value)} was declared`,
  });
};

/** What is found beside what was declared, per position. */
export const evaluateMatch = (
  rule: MatchesPaperworkRequirement,
  facts: Facts,
  advisory: boolean,
): readonly PositionResult[] =>
  positionsFor(rule.per, facts.positions).map((position) =>
    isQuantityName(rule.subject)
      ? numberMatches(rule.subject, facts, position, advisory)
      : answerMatches(rule.subject, facts, position, advisory),
  );
