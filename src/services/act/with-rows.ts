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

/** The line with one commitment more: to every column of the rows that its act wrote, as they stand. */
export const withRows = async (
  em: EntityManager,
  act: string,
  tables: readonly string[],
  line: NewLedgerLine,
): Promise<NewLedgerLine> => {
  const [row] = await em.execute<{ rows: Pick<RowsDocument, 'digest' | 'columns'> }[]>(
    'select append.act_digest(?, ?::text[], null) as rows',
    [act, `{${tables.join()}}`],
  );
  if (row === undefined) throw new Error('The act has no digest.');
  const open = Object.entries(line.contents).flatMap(([role, content]) =>
    content.open ? [role] : [],
  );
  const document: RowsDocument = {
    document: 'tagwire/act-rows',
    version: '1',
    ...row.rows,
    open: open.sort(),
  };
  const rows = { text: canonicalJson(document), open: false };
  return { ...line, contents: { ...line.contents, [ROWS_ROLE]: rows } };
};
