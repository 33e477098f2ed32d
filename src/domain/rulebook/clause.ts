import type { Requirement } from './requirement';

/**
 * How binding a clause is.
 * - `mandatory`: a breach can be decided on it.
 * - `advisory`: it warns and never fails anybody.
 * - `judged`: binding, but no requirement can check it; the officials judge.
 * - `text`: headings, purposes and procedures; nothing to check.
 */
export type Force = 'mandatory' | 'advisory' | 'judged' | 'text';

export interface Definition {
  readonly term: string;
  readonly meaning: string;
}

/** One numbered clause of a rulebook; plain data, kept and hashed as it stands here. */
export interface Clause {
  /** Whole numbers joined by full stops, `7.4.3`. */
  readonly number: string;
  readonly heading: string;
  readonly words: string;
  readonly force: Force;
  readonly requirement?: Requirement | undefined;
  readonly definitions?: readonly Definition[] | undefined;
  /** Numbers of the clauses that this one leans on. */
  readonly refs?: readonly string[] | undefined;
  /** A row of the edition's penalty schedule. */
  readonly penaltyRow?: string | undefined;
}

const NUMBER = /^[1-9]\d{0,3}(\.[1-9]\d{0,3}){0,7}$/;

export const isClauseNumber = (text: string): boolean => NUMBER.test(text);

/** Orders clause numbers as a tree: 7, 7.4, 7.4.9, 7.4.10, 8. */
export const compareClauseNumbers = (a: string, b: string): number => {
  const left = a.split('.').map(Number);
  const right = b.split('.').map(Number);
  for (let i = 0; i < Math.min(left.length, right.length); i += 1) {
    const difference = (left[i] ?? 0) - (right[i] ?? 0);
    if (difference !== 0) return difference;
  }
  return left.length - right.length;
};

export const sortClauses = <C extends { readonly number: string }>(
  clauses: readonly C[],
): readonly C[] => [...clauses].sort((a, b) => compareClauseNumbers(a.number, b.number));

/** The clause above in the tree: `7.4` for `7.4.3`, nothing for `7`. */
export const findParentNumber = (number: string): string | undefined =>
  number.includes('.') ? number.slice(0, number.lastIndexOf('.')) : undefined;
