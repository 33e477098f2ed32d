import type { Bulletin, ClauseChange } from '@/domain/rulebook/bulletin';
import { type Clause, sortClauses } from '@/domain/rulebook/clause';
import { requirementWords } from '@/domain/rulebook/describe';
import type { Edition, PenaltyRow } from '@/domain/rulebook/edition';

export type EditionContent = Pick<Edition, 'clauses' | 'penalties'>;
export type BulletinContent = Pick<Bulletin, 'title' | 'reason' | 'changes' | 'effective'>;

/** One thing of a draft that two people may have changed: what it is called, how it reads, what it is. */
export interface Part {
  readonly id: string;
  readonly label: string;
  readonly words: readonly string[];
  readonly value: unknown;
}

export interface Titled<C> {
  readonly title: string;
  readonly content: C;
}

export const clauseWords = (clause: Clause): readonly string[] =>
  [
    clause.heading,
    clause.words,
    clause.requirement === undefined ? '' : requirementWords(clause.requirement),
    `${clause.force}${clause.penaltyRow === undefined ? '' : `, penalty row ${clause.penaltyRow}`}`,
  ].filter((words) => words.trim() !== '');

const changeWords = (change: ClauseChange): readonly string[] =>
  change.kind === 'withdraw' ? ['Withdrawn'] : [change.kind, ...clauseWords(change.clause)];

const numberOf = (change: ClauseChange): string =>
  change.kind === 'withdraw' ? change.number : change.clause.number;

/** The same number twice is two parts: a draft may be wrong. */
const counted = (parts: readonly Part[]): readonly Part[] => {
  const seen = new Map<string, number>();
  return parts.map((part) => {
    const times = (seen.get(part.id) ?? 0) + 1;
    seen.set(part.id, times);
    return times === 1 ? part : { ...part, id: `${part.id} (${times})` };
  });
};

const titlePart = (title: string): Part => ({
  id: 'title',
  label: 'Title',
  words: [title],
  value: title,
});

export const editionParts = ({ title, content }: Titled<EditionContent>): readonly Part[] =>
  counted([
    titlePart(title),
    ...content.clauses.map((clause) => ({
      id: `clause ${clause.number}`,
      label: `Clause ${clause.number}`,
      words: clauseWords(clause),
      value: clause,
    })),
    {
      id: 'penalties',
      label: 'Penalty schedule',
      words: content.penalties.map((row) => `${row.row}: ${row.penalties.join('; ')}`),
      value: content.penalties,
    },
  ]);

const partValue = (parts: readonly Part[], id: string): unknown =>
  parts.find((part) => part.id === id)?.value;

const valuesOf = <T>(parts: readonly Part[], kind: string): readonly T[] =>
  parts.filter((part) => part.id.startsWith(`${kind} `)).map((part) => part.value as T);

export const editionFrom = (parts: readonly Part[]): Titled<EditionContent> => ({
  title: partValue(parts, 'title') as string,
  content: {
    clauses: sortClauses(valuesOf<Clause>(parts, 'clause')),
    penalties: partValue(parts, 'penalties') as readonly PenaltyRow[],
  },
});

const effectiveWords = ({ effective }: BulletinContent): string =>
  effective.kind === 'instant' ? `from ${effective.at}` : effective.kind.replace('-', ' ');

export const bulletinParts = ({ title, content }: Titled<BulletinContent>): readonly Part[] =>
  counted([
    titlePart(title),
    { id: 'reason', label: 'Reason', words: [content.reason], value: content.reason },
    {
      id: 'effective',
      label: 'When it counts',
      words: [effectiveWords(content)],
      value: content.effective,
    },
    ...content.changes.map((change) => ({
      id: `change ${numberOf(change)}`,
      label: `Change of clause ${numberOf(change)}`,
      words: changeWords(change),
      value: change,
    })),
  ]);

export const bulletinFrom = (parts: readonly Part[]): Titled<BulletinContent> => {
  const title = partValue(parts, 'title') as string;
  return {
    title,
    content: {
      title,
      reason: partValue(parts, 'reason') as string,
      effective: partValue(parts, 'effective') as BulletinContent['effective'],
      changes: valuesOf<ClauseChange>(parts, 'change'),
    },
  };
};
