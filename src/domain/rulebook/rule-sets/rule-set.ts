import { DEFAULT_RULE } from '../../decision/decision-rule';
import type { Written } from '../../quantity/dimension';
import type { Clause } from '../clause';
import type { PenaltyRow } from '../edition';
import type { LimitRequirement } from '../limit';

/** A generic rulebook to start from; every number in it is for the series to set. */
export interface RuleSet {
  readonly id: 'tappet' | 'engine' | 'weights';
  readonly title: string;
  readonly about: string;
  readonly clauses: readonly Clause[];
  readonly penalties: readonly PenaltyRow[];
  /** Where a clause's numbers come from: `common practice`, or an example to be replaced. */
  readonly notes: readonly { readonly clause: string; readonly note: string }[];
}

export const inches = (text: string): Written => ({ text, unit: 'in' });

/** A limit on every position by the default rule, compared as measured. */
export const limit = (
  rule: Omit<LimitRequirement, 'kind' | 'sample' | 'decisionRule' | 'comparison'> &
    Partial<LimitRequirement>,
): LimitRequirement => ({
  kind: 'limit',
  sample: { kind: 'all' },
  decisionRule: DEFAULT_RULE,
  comparison: { method: 'absolute' },
  ...rule,
});

export const text = (number: string, heading: string, words: string): Clause => ({
  number,
  heading,
  words,
  force: 'text',
});

export const PENALTIES: readonly PenaltyRow[] = [
  {
    row: 'A',
    breach: 'A part that can improve performance',
    penalties: [
      'Loss of the event’s result, points and prize money',
      'As before, and no entry at the next event',
      'No entry for the rest of the season',
    ],
    carriesOver: true,
  },
  {
    row: 'B',
    breach: 'A part or paper that does not match what was declared',
    penalties: ['Loss of ten positions', 'Loss of the event’s result, points and prize money'],
    carriesOver: false,
  },
];
