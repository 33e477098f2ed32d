import type { Clause } from '../../rulebook/clause';
import { requirementWords } from '../../rulebook/describe';
import { getQuantityEntry } from '../../rulebook/quantity-catalogue';
import type { Requirement } from '../../rulebook/requirement';
import type { RulesInForce } from '../../rulebook/rules-in-force';

/** How a check without teardown is entered: by one of a few answers, or as a value off a gauge. */
export type LineCheckAsk =
  | {
      readonly kind: 'answer';
      readonly answers: readonly { readonly value: string; readonly label: string }[];
    }
  | { readonly kind: 'value'; readonly unit: string };

export interface LineCheck {
  readonly clause: string;
  readonly heading: string;
  /** What is asked, with its limit and datum. */
  readonly words: string;
  readonly advisory: boolean;
  /** Scales, seals and plug gauges: done at the line as a matter of course. */
  readonly usual: boolean;
  readonly ask: LineCheckAsk;
}

const labelled = (
  ...answers: readonly (readonly [value: string, label: string])[]
): LineCheckAsk => ({
  kind: 'answer',
  answers: answers.map(([value, label]) => ({ value, label })),
});

/** Nothing for what cannot be found out on a whole car: per bore, per cylinder, from papers. */
const askOf = (rule: Requirement): LineCheckAsk | undefined => {
  switch (rule.kind) {
    case 'seal':
      return labelled(
        ['intact', 'Intact'],
        ['broken', 'Broken'],
        ['missing', 'Missing'],
        ['other-number', 'Another number'],
      );
    case 'plug-gauge':
      return rule.per === 'engine' || rule.per === 'car'
        ? labelled(['passed', 'Gauge passed'], ['did-not-pass', 'Did not pass'])
        : undefined;
    case 'yes-no':
      return rule.per === 'engine' || rule.per === 'car'
        ? labelled(['yes', 'Yes'], ['no', 'No'])
        : undefined;
    case 'choice':
      return rule.per === 'engine' || rule.per === 'car'
        ? { kind: 'answer', answers: rule.options }
        : undefined;
    case 'limit':
      return getQuantityEntry(rule.quantity).per === 'car' && rule.per === 'car'
        ? { kind: 'value', unit: rule.unit }
        : undefined;
    default:
      return undefined;
  }
};

const checkOf = (clause: Clause): readonly LineCheck[] => {
  const { requirement: rule, force, number, heading } = clause;
  const ask = rule && (force === 'mandatory' || force === 'advisory') ? askOf(rule) : undefined;
  return rule === undefined || ask === undefined
    ? []
    : [
        {
          clause: number,
          heading,
          words: requirementWords(rule),
          advisory: force === 'advisory',
          usual: ['seal', 'plug-gauge', 'limit'].includes(rule.kind),
          ask,
        },
      ];
};

/** The clauses in force that can be checked on a car that stays together, in the rulebook's order. */
export const lineChecksOf = (rules: Pick<RulesInForce, 'clauses'>): readonly LineCheck[] =>
  rules.clauses.flatMap(checkOf);
