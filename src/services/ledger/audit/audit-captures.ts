import type { EntityManager } from '@mikro-orm/postgresql';
import { notCountedIn, rawBatch } from '@/contracts/case-file/batch-rows';
import { sha256, toHex, utf8 } from '@/domain/ledger/bytes';
import { chainNextHash, chainStart } from '@/domain/ledger/chain';
import type { Line } from '@/domain/ledger/line';
import { hexBytes } from '../../act/append';
import { appendRows } from '../../inspection/capture/append-rows';
import { type AuditFault, faultIn } from './fault';

const inBatch = faultIn('record.capture_batch');
const TABLES = ['reading', 'zero', 'remark'] as const;

interface BatchRow {
  readonly inspection: string;
  readonly number: number;
  readonly previous: string;
  readonly document: string;
  readonly head: string;
  readonly act: string;
  readonly receivedAt: string;
}

type Row = Readonly<Record<string, unknown>>;

/** Texts of before they named these hold no row to them. */
const UNNAMED = new Set(['received_at', 'standing_reason']);

const findText = (document: string) => {
  try {
    return rawBatch(document);
  } catch {
    return undefined;
  }
};

const plain = (value: unknown): string => {
  if (value === undefined || value === null) return 'null';
  if (typeof value === 'object') return JSON.stringify(value, Object.keys(value).sort());
  const text = String(value);
  const instant = /^\d{4}-\d\d-\d\dT/.test(text) ? Date.parse(text) : Number.NaN;
  return Number.isNaN(instant) ? text : new Date(instant).toISOString();
};

/** The rows as the batch's document gives them, by table and id. */
const expectedRows = (batch: BatchRow, seriesId: string): ReadonlyMap<string, Row> => {
  const expected = new Map<string, Row>();
  const text = findText(batch.document);
  if (text === undefined) return expected;
  const { by, clockOffsetMs, receivedAt, marked = {}, rows } = text;
  appendRows(
    (table, made) => {
      for (const row of made) {
        expected.set(`${table}/${String(row['id'])}`, {
          ...hexBytes(row),
          act_id: batch.act,
          received_at: receivedAt,
        });
      }
    },
    {
      seriesId,
      inspectionId: batch.inspection,
      batch: batch.number,
      takenBy: by,
      clockOffsetMs,
      notCounted: notCountedIn(text),
      marks: new Map(Object.entries(marked)),
    },
    rows,
  );
  return expected;
};

const rowFaults = (key: string, expected: Row, kept: Row): readonly AuditFault[] => {
  const [table = '', id = ''] = key.split('/');
  const wrong = Object.keys(kept).filter(
    (column) =>
      plain(expected[column]) !== plain(kept[column]) &&
      (expected['received_at'] !== undefined || !UNNAMED.has(column)),
  );
  return wrong.length === 0
    ? []
    : [faultIn(`record.${table}`)(id, `The batch says otherwise of: ${wrong.join(', ')}.`)];
};

const chainFaults = (batches: readonly BatchRow[], heads: Map<string, Set<string>>) => {
  const faults: AuditFault[] = [];
  let inspection = '';
  let at = new Uint8Array();
  let count = 0;
  for (const batch of batches) {
    if (batch.inspection !== inspection) {
      inspection = batch.inspection;
      at = Uint8Array.from(chainStart(inspection));
      count = 0;
      heads.set(inspection, new Set([toHex(at)]));
    }
    count += 1;
    const what = `inspection ${inspection}, batch ${batch.number}`;
    if (batch.number !== count) faults.push(inBatch(what, `Batch ${count} is missing.`));
    if (batch.previous !== toHex(at))
      faults.push(inBatch(what, 'It does not follow the one before.'));
    at = Uint8Array.from(chainNextHash(at, sha256(utf8(batch.document))));
    if (batch.head !== toHex(at)) faults.push(inBatch(what, 'Its text does not give its head.'));
    heads.get(inspection)?.add(toHex(at));
    const text = findText(batch.document);
    if (text === undefined) {
      faults.push(inBatch(what, 'Its text is none of a batch.'));
      continue;
    }
    const { inspection: said, act, receivedAt } = text;
    if (said !== inspection) faults.push(inBatch(what, 'Its text names another inspection.'));
    if (act !== batch.act) faults.push(inBatch(what, 'Its text names another act.'));
    if (receivedAt !== undefined && plain(receivedAt) !== plain(batch.receivedAt))
      faults.push(inBatch(what, 'Its text says another time of receipt.'));
  }
  return faults;
};

/** Chains from their batches, signed chains from the lines, and each row from its batch. */
export const auditCaptures = async (
  em: EntityManager,
  seriesId: string,
  lines: ReadonlyMap<number, Line>,
): Promise<readonly AuditFault[]> => {
  const batches = await em.execute<BatchRow[]>(
    `select inspection_id as inspection, number, encode(previous, 'hex') as previous, document,
            encode(head, 'hex') as head, act_id as act, to_json(received_at) #>> '{}' as "receivedAt"
     from record.capture_batch where series_id = ? order by inspection_id, number`,
    [seriesId],
  );
  const heads = new Map<string, Set<string>>();
  const faults: AuditFault[] = [...chainFaults(batches, heads)];
  for (const [index, { refs }] of lines) {
    const { chain, inspection = '' } = refs;
    const known = heads.get(inspection)?.has(chain ?? '') ?? false;
    if (chain === undefined || known || chain === toHex(chainStart(inspection))) continue;
    const words = `The batches do not lead to the chain that line ${index} was signed over.`;
    faults.push(inBatch(`inspection ${inspection}`, words));
  }
  const expected = new Map<string, Row>();
  for (const batch of batches)
    for (const [key, row] of expectedRows(batch, seriesId)) expected.set(key, row);
  const seen = new Set<string>();
  for (const table of TABLES) {
    const rows = await em.execute<{ row: Row }[]>(
      `select to_jsonb(t) as row from record.${table} t where series_id = ?`,
      [seriesId],
    );
    for (const { row } of rows) {
      const key = `${table}/${String(row['id'])}`;
      const wanted = expected.get(key);
      seen.add(key);
      if (wanted === undefined) {
        faults.push(faultIn(`record.${table}`)(String(row['id']), 'No batch holds this row.'));
      } else faults.push(...rowFaults(key, wanted, row));
    }
  }
  for (const key of expected.keys()) {
    const [table = '', id = ''] = key.split('/');
    if (!seen.has(key)) faults.push(faultIn(`record.${table}`)(id, 'The row is missing.'));
  }
  return faults;
};
