import type { EntityManager } from '@mikro-orm/postgresql';
import { sha256, toHex, utf8 } from '@/domain/ledger/bytes';
import type { RowsDocument } from '../../act/with-rows';

/** A line's own word on the rows that its act wrote. */
export interface NamedRows {
  readonly line: number;
  readonly act: string;
  readonly document: RowsDocument;
}

/** Lines whose documents name a table or column that is not in the record. */
export const unknownColumns = async (
  em: EntityManager,
  named: readonly NamedRows[],
): Promise<ReadonlySet<number>> => {
  const rows = await em.execute<{ name: string }[]>(
    `select c.relname || '.' || a.attname as name from pg_attribute a
     join pg_class c on c.oid = a.attrelid and c.relkind = 'r'
     join pg_namespace n on n.oid = c.relnamespace and n.nspname = 'record'
     where a.attnum > 0 and not a.attisdropped`,
  );
  const known = new Set(rows.map(({ name }) => name));
  const hasAll = ({ columns }: RowsDocument) =>
    Object.entries(columns).every(
      ([table, names]) => names.length > 0 && names.every((name) => known.has(`${table}.${name}`)),
    );
  return new Set(named.filter(({ document }) => !hasAll(document)).map(({ line }) => line));
};

/**
 * The digest of each act's rows as they stand, hexadecimal, by line: what `append.act_digest` gives for
 * one act, with one query for each table and list of columns however many acts there are.
 */
export const digestsNow = async (
  em: EntityManager,
  named: readonly NamedRows[],
): Promise<ReadonlyMap<number, string>> => {
  const asked = new Map<string, { table: string; columns: readonly string[]; acts: Set<string> }>();
  for (const { act, document } of named) {
    for (const [table, columns] of Object.entries(document.columns)) {
      const key = `${table}(${columns.join()})`;
      const group = asked.get(key) ?? { table, columns, acts: new Set<string>() };
      asked.set(key, group);
      group.acts.add(act);
    }
  }
  const found = new Map<string, string>();
  for (const [key, { table, columns, acts }] of asked) {
    const rows = await em.execute<{ act: string; rows: string }[]>(
      'select act, rows from append.act_rows(?, ?::text[], ?::uuid[])',
      [table, `{${columns.join()}}`, `{${[...acts].join()}}`],
    );
    for (const { act, rows: text } of rows) found.set(`${key} ${act}`, text);
  }
  return new Map(
    named.map(({ line, act, document }) => {
      const text = Object.entries(document.columns)
        .sort(([a], [b]) => (a < b ? -1 : 1))
        .map(
          ([table, columns]) =>
            `${table}\n${found.get(`${table}(${columns.join()}) ${act}`) ?? ''}\n`,
        )
        .join('');
      return [line, toHex(sha256(utf8(text)))];
    }),
  );
};
