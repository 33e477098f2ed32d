import type { SentReading, SentRemark, SentRow, SentZero } from '@/contracts/inspection/rows';
import type { Dimension, Written } from '@/domain/quantity/dimension';
import { fromStored, type Stored, toStored } from '@/domain/quantity/stored';
import { getQuantityEntry, isQuantityName } from '@/domain/rulebook/quantity-catalogue';
import type { Act } from '../../act/perform-act';

/** What the server adds to every row of one batch. */
export interface BatchContext {
  readonly seriesId: string;
  readonly inspectionId: string;
  readonly batch: number;
  readonly takenBy: string;
  readonly clockOffsetMs: number;
  /** Why rows do not count, by their ids; all others are accepted. */
  readonly notCounted: ReadonlyMap<string, string>;
  /** Why a row that counts supports no breach, by its id. */
  readonly marks: ReadonlyMap<string, string>;
}

const stored = (written: Written, dimension: Dimension): Stored =>
  toStored(fromStored(written, dimension));

const common = (context: BatchContext, row: SentRow) => ({
  series_id: context.seriesId,
  id: row.id,
  inspection_id: context.inspectionId,
  batch: context.batch,
  taken_by: context.takenBy,
  occurred_at: row.occurredAt,
  clock_offset_ms: context.clockOffsetMs,
  standing: context.notCounted.has(row.id) ? 'received' : 'accepted',
  standing_reason: context.notCounted.get(row.id) ?? context.marks.get(row.id) ?? null,
});

const placed = ({ place }: SentReading | SentRemark) => ({
  bank: place.bank,
  cylinder: place.cylinder,
  valve: place.valve,
  place_index: place.index ?? null,
});

const readingColumns = (context: BatchContext, row: SentReading) => {
  if (!isQuantityName(row.quantity)) throw new RangeError(`no quantity ${row.quantity}`);
  const value = stored(row.value, getQuantityEntry(row.quantity).dimension);
  return {
    ...common(context, row),
    ...placed(row),
    quantity: row.quantity,
    depth: row.depth,
    axis: row.axis,
    repeat: row.repeat,
    set_number: row.set,
    method: row.method,
    gauge_id: row.gaugeId,
    zero_run_id: row.zeroRunId ?? null,
    value_text: value.text,
    value_unit: value.unit,
    value_exact: String(value.exact),
    temperatures: row.temperatures ?? {},
    reference_part: row.referencePart ?? null,
  };
};

const zeroColumns = (context: BatchContext, row: SentZero) => {
  const size = row.size === undefined ? undefined : stored(row.size, 'length');
  const reading = stored(row.reading, 'length');
  return {
    ...common(context, row),
    run_id: row.runId,
    kind: row.end,
    gauge_id: row.gaugeId,
    zeroed_on: row.zeroedOn,
    ring_id: row.ringId ?? null,
    size_text: size?.text ?? null,
    size_unit: size?.unit ?? null,
    size_exact: size === undefined ? null : String(size.exact),
    reading_text: reading.text,
    reading_unit: reading.unit,
    reading_exact: String(reading.exact),
    temperatures: {},
  };
};

const remarkColumns = (context: BatchContext, row: SentRemark) => ({
  ...common(context, row),
  ...placed(row),
  kind: row.remark,
  reading_id: 'readingId' in row ? row.readingId : null,
  subject: 'subject' in row ? row.subject : '',
  answer: 'value' in row ? { value: row.value } : {},
  reason: row.reason,
});

/** Appends the rows of one batch, each kind to its table; readings before what points back at them. */
export const appendRows = (
  append: Act['append'],
  context: BatchContext,
  rows: readonly SentRow[],
): void => {
  append(
    'zero',
    rows.flatMap((row) => (row.kind === 'zero' ? [zeroColumns(context, row)] : [])),
  );
  append(
    'reading',
    rows.flatMap((row) => (row.kind === 'reading' ? [readingColumns(context, row)] : [])),
  );
  append(
    'remark',
    rows.flatMap((row) => (row.kind === 'remark' ? [remarkColumns(context, row)] : [])),
  );
};
