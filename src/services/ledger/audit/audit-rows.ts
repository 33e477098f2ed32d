import type { EntityManager } from '@mikro-orm/postgresql';
import type { Line } from '@/domain/ledger/line';
import { ROWS_ROLE, type RowsDocument } from '../../act/with-rows';
import { type AuditFault, faultIn } from './fault';

/** Rows of these come in batches and are held against those; lines and heads have their own checks. */
const ELSEWHERE = new Set(['reading', 'zero', 'remark', 'capture_batch', 'ledger_line']);

const readDocuments = async (em: EntityManager, seriesId: string) => {
  const rows = await em.execute<{ index: string; content: string | null }[]>(
    `select line_index as index, content from record.ledger_content
     where series_id = ? and role = ? order by line_index`,
    [seriesId, ROWS_ROLE],
  );
  return new Map(
    rows.flatMap(({ index, content }) =>
      content === null ? [] : [[Number(index), JSON.parse(content) as RowsDocument]],
    ),
  );
};

const digestNow = async (em: EntityManager, act: string, { columns }: RowsDocument) => {
  const tables = Object.keys(columns);
  const [row] = await em.execute<{ digest: string }[]>(
    "select append.act_digest(?, ?::text[], ?::jsonb) ->> 'digest' as digest",
    [act, `{${tables.join()}}`, JSON.stringify(columns)],
  );
  return row?.digest;
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
  return rows.flatMap(({ index, role, open }) => {
    const said = documents.get(Number(index))?.open;
    return said === undefined || said.includes(role) === open
      ? []
      : [
          faultIn('record.ledger_content')(
            `line ${index}, ${role}`,
            'Whether this is open to everybody was changed.',
          ),
        ];
  });
};

/** Tables of the record whose rows name the act that wrote them. */
const tablesByAct = (em: EntityManager) =>
  em.execute<{ name: string }[]>(
    `select c.relname as name from pg_class c
     join pg_namespace n on n.oid = c.relnamespace and n.nspname = 'record'
     join pg_attribute a on a.attrelid = c.oid and a.attname = 'act_id' and not a.attisdropped
     join pg_attribute s on s.attrelid = c.oid and s.attname = 'series_id' and not s.attisdropped
     where c.relkind = 'r' order by 1`,
  );

const strayFaults = async (
  em: EntityManager,
  seriesId: string,
  claimed: ReadonlyMap<string, ReadonlySet<string>>,
): Promise<readonly AuditFault[]> => {
  const faults: AuditFault[] = [];
  for (const { name } of await tablesByAct(em)) {
    if (ELSEWHERE.has(name)) continue;
    const rows = await em.execute<{ act: string | null }[]>(
      `select distinct act_id as act from record."${name}" where series_id = ?`,
      [seriesId],
    );
    for (const { act } of rows) {
      if (act !== null && claimed.get(act)?.has(name)) continue;
      const words = 'A row belongs to no line of the ledger.';
      faults.push(faultIn(`record.${name}`)(`act ${act ?? 'none'}`, words));
    }
  }
  return faults;
};

/** Every row that an act with a line wrote, column by column, and rows that no line knows of. */
export const auditRows = async (
  em: EntityManager,
  seriesId: string,
  lines: ReadonlyMap<number, Line>,
  erasedActs: ReadonlySet<string>,
): Promise<readonly AuditFault[]> => {
  const documents = await readDocuments(em, seriesId);
  const faults: AuditFault[] = [];
  const claimed = new Map<string, Set<string>>();
  for (const [index, document] of documents) {
    const act = lines.get(index)?.act;
    if (act === undefined) continue;
    const tables = Object.keys(document.columns);
    claimed.set(act, new Set([...(claimed.get(act) ?? []), ...tables]));
    if (erasedActs.has(act) || (await digestNow(em, act, document)) === document.digest) continue;
    faults.push(
      faultIn(tables.map((table) => `record.${table}`).join(' or '))(
        `act ${act}, line ${index}`,
        'The rows of this act are not those that its line commits to.',
      ),
    );
  }
  return [
    ...faults,
    ...(await openFaults(em, seriesId, documents)),
    ...(await strayFaults(em, seriesId, claimed)),
  ];
};
