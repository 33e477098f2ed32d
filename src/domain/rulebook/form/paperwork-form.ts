import type { Clause, Force } from '../clause';
import { requirementWords } from '../describe';
import { getQuantityEntry, isQuantityName } from '../quantity-catalogue';
import type { RulesInForce } from '../rules-in-force';
import type { PaperworkForm, Question } from './form';
import { sheetsFrom } from './sheets';

const STRENGTH: readonly Force[] = ['mandatory', 'judged', 'advisory', 'text'];

const stronger = (a: Force, b: Force): Force =>
  STRENGTH.indexOf(a) <= STRENGTH.indexOf(b) ? a : b;

const findQuestion = (clause: Clause): Question | undefined => {
  const rule = clause.requirement;
  if (rule === undefined) return undefined;
  const base = { clauses: [clause.number], force: clause.force, rule: requirementWords(rule) };
  switch (rule.kind) {
    case 'choice': {
      const { kind, subject, question, per, options } = rule;
      return { ...base, kind, subject, question, per, options };
    }
    case 'yes-no': {
      const { kind, subject, question, per } = rule;
      return { ...base, kind, subject, question, per };
    }
    case 'matches-paperwork': {
      const { subject, question, per } = rule;
      return isQuantityName(subject)
        ? {
            ...base,
            kind: 'number',
            subject,
            question,
            per,
            quantity: subject,
            unit: getQuantityEntry(subject).unit,
          }
        : { ...base, kind: 'text', subject, question, per };
    }
    case 'limit':
    case 'reference-average': {
      if (rule.per !== 'engine' && rule.per !== 'car') return undefined;
      const { quantity, unit, per, datum, checkingLifter } = rule;
      const question = getQuantityEntry(quantity).label;
      return {
        ...base,
        kind: 'number',
        subject: quantity,
        question,
        per,
        quantity,
        unit,
        datum,
        checkingLifter,
      };
    }
    default:
      return undefined;
  }
};

const merged = (questions: readonly Question[]): readonly Question[] => {
  const bySubject = new Map<string, Question>();
  for (const question of questions) {
    const known = bySubject.get(question.subject);
    bySubject.set(
      question.subject,
      known === undefined
        ? question
        : {
            ...known,
            clauses: [...known.clauses, ...question.clauses],
            force: stronger(known.force, question.force),
            rule: `${known.rule}. ${question.rule}`,
          },
    );
  }
  return [...bySubject.values()];
};

/**
 * The declaration form, the shot list and the measurement sheets that the rules in force ask for,
 * each once however many clauses want it. Numbers per bore, lifter and cylinder stand on sheets.
 */
export const paperworkForm = (rules: Pick<RulesInForce, 'clauses'>): PaperworkForm => ({
  questions: merged(rules.clauses.flatMap((clause) => findQuestion(clause) ?? [])),
  photographs: rules.clauses.flatMap(({ number, heading, requirement }) =>
    requirement?.kind === 'photograph'
      ? [{ subject: requirement.subject, clause: number, heading, visible: requirement.visible }]
      : [],
  ),
  sheets: sheetsFrom(rules.clauses),
});
