import type { Clause } from './clause';
import { compareClauseNumbers } from './clause';
import { requirementWords } from './describe';
import { toDocument } from './document';

export type ChangedPart =
  | 'heading'
  | 'words'
  | 'requirement'
  | 'force'
  | 'definitions'
  | 'refs'
  | 'penalty';

export interface PartDifference {
  readonly part: ChangedPart;
  readonly before: string;
  readonly after: string;
}

/** What became of one clause between two points in time. */
export type ClauseDifference =
  | { readonly number: string; readonly kind: 'added'; readonly after: Clause }
  | { readonly number: string; readonly kind: 'withdrawn'; readonly before: Clause }
  | {
      readonly number: string;
      readonly kind: 'changed';
      readonly before: Clause;
      readonly after: Clause;
      readonly parts: readonly PartDifference[];
    };

const parts = (clause: Clause): Readonly<Record<ChangedPart, string>> => ({
  heading: clause.heading,
  words: clause.words,
  requirement: clause.requirement === undefined ? '' : requirementWords(clause.requirement),
  force: clause.force,
  definitions: (clause.definitions ?? []).map((row) => `${row.term}: ${row.meaning}`).join('; '),
  refs: (clause.refs ?? []).join(', '),
  penalty: clause.penaltyRow ?? '',
});

const ORDER = [
  'heading',
  'words',
  'requirement',
  'force',
  'definitions',
  'refs',
  'penalty',
] as const;

const changed = (before: Clause, after: Clause): readonly PartDifference[] => {
  const left = parts(before);
  const right = parts(after);
  const found = ORDER.filter((part) => left[part] !== right[part]).map((part) => ({
    part,
    before: left[part],
    after: right[part],
  }));
  const same = (value: Clause) => JSON.stringify(toDocument(value.requirement ?? null));
  // Keys and subjects have no words of their own, yet a change of them is a change of the rule.
  const hidden = same(before) !== same(after) && !found.some((row) => row.part === 'requirement');
  return hidden
    ? [...found, { part: 'requirement', before: same(before), after: same(after) }]
    : found;
};

/** Clause by clause, in the tree's order; clauses that stayed as they were are left out. */
export const differences = (
  before: readonly Clause[],
  after: readonly Clause[],
): readonly ClauseDifference[] => {
  const left = new Map(before.map((clause) => [clause.number, clause]));
  const right = new Map(after.map((clause) => [clause.number, clause]));
  const numbers = [...new Set([...left.keys(), ...right.keys()])].sort(compareClauseNumbers);
  return numbers.flatMap((number): readonly ClauseDifference[] => {
    const was = left.get(number);
    const is = right.get(number);
    if (was === undefined) return is === undefined ? [] : [{ number, kind: 'added', after: is }];
    if (is === undefined) return [{ number, kind: 'withdrawn', before: was }];
    const found = changed(was, is);
    return found.length === 0
      ? []
      : [{ number, kind: 'changed', before: was, after: is, parts: found }];
  });
};
