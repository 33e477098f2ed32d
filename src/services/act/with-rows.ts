import type { EntityManager } from '@mikro-orm/postgresql';
import { canonicalJson } from '@/domain/ledger/canonical';
import type { NewLedgerLine } from './append';

/** Under which role a line commits to how its act's rows stand in the database. */
export const ROWS_ROLE = 'rows';

export interface RowsDocument {
  readonly document: 'tagwire/act-rows';
  readonly version: '1';
  /** Hexadecimal SHA-256 over the named columns of the act's rows. */
  readonly digest: string;
  readonly columns: Readonly<Record<string, readonly string[]>>;
  /** Roles of the line whose content everybody may see. */
  readonly open: readonly string[];
}

/** What the database says of an act's rows, and the number of its first line. */
export interface ClosedAct {
  readonly rows: Pick<RowsDocument, 'digest' | 'columns'>;
  readonly index: number;
}

/** Stores the answer, digests the act's rows, and takes the next line of the series' ledger: one question. */
export const closeAct = async (
  em: EntityManager,
  act: string,
  answer: string,
  tables: readonly string[],
  seriesId: string,
): Promise<ClosedAct> => {
  const [row] = await em.execute<{ rows: ClosedAct['rows']; index: string }[]>(
    'select * from append.close_act(?, ?::jsonb, ?::text[], ?)',
    [act, answer, `{${tables.join()}}`, seriesId],
  );
  if (row === undefined) throw new Error('The act has no digest.');
  return { rows: row.rows, index: Number(row.index) };
};

/** The line with one commitment more: to every column of the rows that its act wrote, as they stand. */
export const withRows = (line: NewLedgerLine, rows: ClosedAct['rows']): NewLedgerLine => {
  const open = Object.entries(line.contents).flatMap(([role, content]) =>
    content.open ? [role] : [],
  );
  const document: RowsDocument = {
    document: 'tagwire/act-rows',
    version: '1',
    ...rows,
    open: open.sort(),
  };
  const said = { text: canonicalJson(document), open: false };
  return { ...line, contents: { ...line.contents, [ROWS_ROLE]: said } };
};
