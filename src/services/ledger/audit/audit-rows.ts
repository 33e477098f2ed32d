import type { EntityManager } from '@mikro-orm/postgresql';
import type { Line } from '@/domain/ledger/line';
import { ROWS_ROLE, type RowsDocument } from '../../act/with-rows';
import { digestsNow, type NamedRows, unknownColumns } from './act-digests';
import { coversErasable, erasableFaults } from './erasable';
import type { Erasures } from './erasures';
import { type AuditFault, faultIn } from './fault';

/** Rows of these come in batches and are held against those; lines and heads have their own checks. */
const ELSEWHERE = new Set(['reading', 'zero', 'remark', 'capture_batch', 'ledger_line']);

/** Lines whose rows are digested at once. */
const BLOCK = 500;

const parse = (content: string): readonly RowsDocument[] => {
  try {
    return [JSON.parse(content) as RowsDocument];
  } catch {
    // Whoever holds contents against their lines says that this is not what the line commits to.
    return [];
  }
};

const readDocuments = async (em: EntityManager, seriesId: string) => {
  const rows = await em.execute<{ index: string; content: string | null }[]>(
    `select line_index as index, content from record.ledger_content
     where series_id = ? and role = ? order by line_index`,
    [seriesId, ROWS_ROLE],
  );
  return new Map(
    rows.flatMap(({ index, content }) =>
      parse(content ?? '').map((document) => [Number(index), document] as const),
    ),
  );
};

const openFaults = async (
  em: EntityManager,
  seriesId: string,
  documents: ReadonlyMap<number, RowsDocument>,
): Promise<readonly AuditFault[]> => {
  const rows = await em.execute<{ index: string; role: string; open: boolean }[]>(
    'select line_index as index, role, open from record.ledger_content where series_id = ?',
    [seriesId],
  );
  const words = 'Whether this is open to everybody was changed.';
  return rows.flatMap(({ index, role, open }) => {
    const said = documents.get(Number(index))?.open;
    return said === undefined || said.includes(role) === open
      ? []
      : [faultIn('record.ledger_content')(`line ${index}, ${role}`, words)];
  });
};

/** Tables of the record whose rows name the act that wrote them, and whether they name a series. */
const tablesByAct = (em: EntityManager) =>
  em.execute<{ name: string; ofSeries: boolean }[]>(
    `select c.relname as name, s.attname is not null as "ofSeries" from pg_class c
     join pg_namespace n on n.oid = c.relnamespace and n.nspname = 'record'
     join pg_attribute a on a.attrelid = c.oid and a.attname = 'act_id' and not a.attisdropped
     left join pg_attribute s on s.attrelid = c.oid and s.attname = 'series_id' and not s.attisdropped
     where c.relkind = 'r' order by 1`,
  );

/** Acts whose rows in a table of no series are held by no line of any ledger. */
const unheldActs = (em: EntityManager, table: string) =>
  em.execute<{ act: string | null }[]>(
    `select distinct t.act_id as act from record."${table}" t where not exists (
       select from record.ledger_line l
       join record.ledger_content c on c.series_id = l.series_id and c.line_index = l.index
         and c.role = ?
       where l.act_id = t.act_id and append.json_of(c.content) -> 'columns' -> ? is not null)`,
    [ROWS_ROLE, table],
  );

const strayFaults = async (
  em: EntityManager,
  seriesId: string,
  claimed: ReadonlyMap<string, ReadonlySet<string>>,
): Promise<readonly AuditFault[]> => {
  const faults: AuditFault[] = [];
  for (const { name, ofSeries } of await tablesByAct(em)) {
    if (ELSEWHERE.has(name)) continue;
    const rows = ofSeries
      ? await em.execute<{ act: string | null }[]>(
          `select distinct act_id as act from record."${name}" where series_id = ?`,
          [seriesId],
        )
      : await unheldActs(em, name);
    for (const { act } of rows) {
      if (ofSeries && act !== null && claimed.get(act)?.has(name)) continue;
      const words = 'A row belongs to no line of the ledger.';
      faults.push(faultIn(`record.${name}`)(`act ${act ?? 'none'}`, words));
    }
  }
  return faults;
};

const digestFaults = async (
  em: EntityManager,
  named: readonly NamedRows[],
): Promise<readonly AuditFault[]> => {
  const faults: AuditFault[] = [];
  const unknown = await unknownColumns(em, named);
  for (let from = 0; from < named.length; from += BLOCK) {
    const block = named.slice(from, from + BLOCK).filter((one) => !unknown.has(one.line));
    const digests = await digestsNow(em, block);
    for (const { act, line, document } of block) {
      if (digests.get(line) === document.digest) continue;
      const where = Object.keys(document.columns).map((table) => `record.${table}`);
      const words = 'The rows of this act are not those that its line commits to.';
      faults.push(faultIn(where.join(' or '))(`act ${act}, line ${line}`, words));
    }
  }
  for (const line of unknown) {
    const words = 'It names columns that the record does not have.';
    faults.push(faultIn('record.ledger_content')(`line ${line}, ${ROWS_ROLE}`, words));
  }
  return faults;
};

/** Every row that an act with a line wrote, column by column, and rows that no line knows of. */
export const auditRows = async (
  em: EntityManager,
  seriesId: string,
  lines: ReadonlyMap<number, Line>,
  { contents, acts: erasedActs }: Erasures,
): Promise<readonly AuditFault[]> => {
  const documents = await readDocuments(em, seriesId);
  const claimed = new Map<string, Set<string>>();
  const named: NamedRows[] = [];
  for (const [line, document] of documents) {
    const act = lines.get(line)?.act;
    if (act === undefined) continue;
    const tables = Object.keys(document.columns);
    claimed.set(act, new Set([...(claimed.get(act) ?? []), ...tables]));
    // A digest of before erasable columns were left out of it ends with them.
    const gone = erasedActs.has(act) && coversErasable(document.columns);
    if (!gone) named.push({ act, line, document });
  }
  return [
    ...(await digestFaults(em, named)),
    ...(await erasableFaults(em, seriesId, contents)),
    ...(await openFaults(em, seriesId, documents)),
    ...(await strayFaults(em, seriesId, claimed)),
  ];
};
