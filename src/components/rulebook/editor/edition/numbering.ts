import { type Clause, findParentNumber, sortClauses } from '@/domain/rulebook/clause';

export interface Row {
  /** Of this screen; stays when the number changes. */
  readonly key: string;
  readonly clause: Clause;
}

export const sortRows = (rows: readonly Row[]): readonly Row[] =>
  sortClauses(rows.map((row) => ({ number: row.clause.number, row }))).map(({ row }) => row);

const lastStep = (number: string): number => Number(number.split('.').at(-1));

/** The next free number beside `after` in the tree; at the end of the top level without one. */
export const numberBeside = (rows: readonly Row[], after: string | undefined): string => {
  const parent = after === undefined ? undefined : findParentNumber(after);
  return numberUnder(rows, parent);
};

/** The next free number one level below. */
export const numberUnder = (rows: readonly Row[], parent: string | undefined): string => {
  const used = rows
    .map((row) => row.clause.number)
    .filter((number) => findParentNumber(number) === parent)
    .map(lastStep);
  const next = Math.max(0, ...used) + 1;
  return parent === undefined ? String(next) : `${parent}.${next}`;
};

/** Gives a clause another number; what stands below it and what refers to it follow. */
export const renumber = (rows: readonly Row[], key: string, to: string): readonly Row[] => {
  const from = rows.find((row) => row.key === key)?.clause.number;
  if (from === undefined || from === to) return rows;
  const below = `${from}.`;
  const moved = new Map(
    rows
      .filter((row) => row.key === key || row.clause.number.startsWith(below))
      .map((row) => [row.clause.number, to + row.clause.number.slice(from.length)]),
  );
  // With two clauses of one number only the chosen one moves, and nobody's references follow.
  const twice = rows.some((row) => row.key !== key && row.clause.number === from);
  const change = ({ key: own, clause }: Row): Row => {
    const number = own === key ? to : twice ? clause.number : moved.get(clause.number);
    const refs = twice ? clause.refs : clause.refs?.map((ref) => moved.get(ref) ?? ref);
    const same =
      (number ?? clause.number) === clause.number && String(refs) === String(clause.refs);
    if (same) return { key: own, clause };
    return {
      key: own,
      clause: { ...clause, number: number ?? clause.number, ...(refs && { refs }) },
    };
  };
  return sortRows(rows.map(change));
};
