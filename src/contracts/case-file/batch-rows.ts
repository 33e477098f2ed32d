import * as z from 'zod/mini';
import type { ReadingRow, RemarkRow, ZeroRow } from '@/domain/inspection/capture/rows';
import type { QuantityName } from '@/domain/rulebook/quantity-catalogue';
import { captureRow, type SentRow } from '../inspection/rows';

export interface RawRows {
  readonly readings: readonly ReadingRow[];
  readonly zeros: readonly ZeroRow[];
  readonly remarks: readonly RemarkRow[];
}

const loose = z.looseObject({});
const batchShape = z.looseObject({
  v: z.literal('1'),
  type: z.literal('tagwire/batch'),
  inspection: z.string(),
  act: z.string(),
  by: z.string(),
  clockOffsetMs: z.string().check(z.regex(/^-?\d{1,12}$/)),
  /** Why none of the batch counts. */
  received: z.optional(z.string()),
  /** Why single rows do not count, by their ids. */
  receivedRows: z.optional(z.record(z.string(), z.string())),
  /** The server's clock; ISO 8601 in UTC. */
  receivedAt: z.optional(z.string()),
  /** Why a row that counts supports no breach, by its id. */
  marked: z.optional(z.record(z.string(), z.string())),
  rows: z.array(loose),
});

/** Whole numbers stand as text in a document; the rows' contract has them as numbers. */
const withNumbers = (row: Record<string, unknown>): Record<string, unknown> => {
  const number = (key: string, of: Record<string, unknown>) =>
    typeof of[key] === 'string' ? { [key]: Number(of[key]) } : {};
  const place = row['place'];
  const placed =
    typeof place === 'object' && place !== null
      ? { place: { ...place, ...number('index', place as Record<string, unknown>) } }
      : {};
  return { ...row, ...number('repeat', row), ...number('set', row), ...placed };
};

/** A batch as it was sent, with who sent it. Throws on a text that is none. */
export const rawBatch = (document: string) => {
  const { rows, clockOffsetMs, ...batch } = batchShape.parse(JSON.parse(document));
  return {
    ...batch,
    clockOffsetMs: Number(clockOffsetMs),
    rows: rows.map((row): SentRow => captureRow.parse(withNumbers(row))),
  };
};

/** Why rows of a batch do not count, by their ids; of old texts one reason holds for all. */
export const notCountedIn = ({
  received,
  receivedRows = {},
  rows,
}: Pick<ReturnType<typeof rawBatch>, 'received' | 'receivedRows' | 'rows'>): ReadonlyMap<
  string,
  string
> =>
  received === undefined
    ? new Map(Object.entries(receivedRows))
    : new Map(rows.map((row) => [row.id, received]));

const rowsOf = (document: string): RawRows => {
  const batch = rawBatch(document);
  const { rows } = batch;
  const notCounted = notCountedIn(batch);
  const common = (row: SentRow) => ({
    id: row.id,
    takenBy: batch.by,
    occurredAt: new Date(Date.parse(row.occurredAt) + batch.clockOffsetMs).toISOString(),
    standing: notCounted.has(row.id) ? ('received' as const) : ('accepted' as const),
  });
  const readings: ReadingRow[] = [];
  const zeros: ZeroRow[] = [];
  const remarks: RemarkRow[] = [];
  for (const row of rows) {
    if (row.kind === 'reading') {
      const { kind: _kind, quantity, ...rest } = row;
      readings.push({ ...rest, ...common(row), quantity: quantity as QuantityName });
    } else if (row.kind === 'zero') {
      const { kind: _kind, end, ...rest } = row;
      zeros.push({ ...rest, ...common(row), kind: end });
    } else {
      remarks.push({
        ...common(row),
        kind: row.remark,
        ...('readingId' in row ? { readingId: row.readingId } : {}),
        place: row.place,
        subject: 'subject' in row ? row.subject : '',
        answer: 'value' in row ? { value: row.value } : {},
        reason: row.reason,
      });
    }
  }
  return { readings, zeros, remarks };
};

/** The rows of all batches in order, as the domain assesses them. Throws on what is no batch. */
export const rowsOfBatches = (documents: readonly string[]): RawRows => {
  const all = documents.map(rowsOf);
  return {
    readings: all.flatMap((rows) => rows.readings),
    zeros: all.flatMap((rows) => rows.zeros),
    remarks: all.flatMap((rows) => rows.remarks),
  };
};
