import type { PositionResult } from '../clause-result';
import type { Per } from '../quantities/entry';
import type {
  ChoiceRequirement,
  PhotographRequirement,
  PlugGaugeRequirement,
  SealRequirement,
  SheetRequirement,
  YesNoRequirement,
} from '../requirement';
import { type Facts, findAnswer, positionsFor, wasOutOfReach } from './facts';
import { missingAt } from './held-number';

/** A requirement that an answer meets or does not. */
export type AnsweredRequirement =
  | ChoiceRequirement
  | YesNoRequirement
  | PlugGaugeRequirement
  | SealRequirement;

const PLUG: Readonly<Record<string, string>> = {
  passed: 'the gauge passed',
  'did-not-pass': 'the gauge did not pass',
};

const SEAL: Readonly<Record<string, string>> = {
  intact: 'intact, with the number on record',
  broken: 'broken',
  missing: 'missing',
  'other-number': 'another number than on record',
};

const meets = (rule: AnsweredRequirement, answer: string): boolean => {
  switch (rule.kind) {
    case 'choice':
      return rule.allowed.includes(answer);
    case 'yes-no':
      return answer === rule.required;
    case 'plug-gauge':
      return answer === (rule.gauge === 'go' ? 'passed' : 'did-not-pass');
    case 'seal':
      return answer === 'intact';
  }
};

const words = (rule: AnsweredRequirement, answer: string): string => {
  switch (rule.kind) {
    case 'choice':
      return rule.options.find((option) => option.value === answer)?.label ?? answer;
    case 'yes-no':
      return `${rule.question} ${answer === 'yes' ? 'Yes' : 'No'}`;
    case 'plug-gauge':
      return PLUG[answer] ?? answer;
    case 'seal':
      return `seal at ${rule.place} ${SEAL[answer] ?? answer}`;
  }
};

const perOf = (rule: AnsweredRequirement): Per => (rule.kind === 'seal' ? 'engine' : rule.per);

/**
 * Answers are a choice's key, `yes` / `no`, `passed` / `did-not-pass` for a plug gauge, and `intact`,
 * `broken`, `missing` or `other-number` for a seal. Asked per bore, an answer for the whole engine
 * serves every bore that has none of its own.
 */
export const evaluateAnswer = (
  rule: AnsweredRequirement,
  facts: Facts,
  advisory: boolean,
): readonly PositionResult[] =>
  positionsFor(perOf(rule), facts.positions).map((position) => {
    const answer =
      findAnswer(facts, rule.subject, position.key) ?? findAnswer(facts, rule.subject, 'engine');
    if (answer === undefined)
      return missingAt(position, wasOutOfReach(facts, rule.subject, position.key));
    const good = meets(rule, answer);
    return {
      position: position.key,
      state: good ? 'complies' : 'does-not-comply',
      pass: good ? true : advisory ? null : false,
      fit: null,
      answer,
      sentence: `${position.label}: ${words(rule, answer)}: ${good ? 'complies' : 'does not comply'}.`,
    };
  });

/** A photograph or a sheet is there or not yet; that alone breaches nothing. */
export const evaluateEvidence = (
  rule: PhotographRequirement | SheetRequirement,
  facts: Facts,
): readonly PositionResult[] => {
  const papers = facts.origin === 'declared' ? facts : (facts.declared ?? facts);
  const there = papers.evidence.includes(rule.subject);
  const what =
    rule.kind === 'photograph' ? `Photograph showing ${rule.visible.join(', ')}` : rule.title;
  return [
    {
      position: 'engine',
      state: there ? 'complies' : 'not-measured',
      pass: there ? true : null,
      fit: null,
      sentence: `${what}: ${there ? 'handed in' : 'not handed in'}.`,
    },
  ];
};
