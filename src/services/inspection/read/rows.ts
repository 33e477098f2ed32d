import type { EntityManager } from '@mikro-orm/postgresql';
import type {
  Captured,
  LoggedTemperatures,
  Place,
  ReadingRow,
  RemarkRow,
  ZeroRow,
} from '@/domain/inspection/capture/rows';
import type { Valve } from '@/domain/tappet/layout/bore-layout';

interface Row {
  readonly id: string;
  readonly inspection_id: string;
  readonly taken_by: string;
  readonly occurred_at: Date;
  readonly clock_offset_ms: number;
  readonly standing: 'accepted' | 'received';
}

interface AtPlace {
  readonly bank: string;
  readonly cylinder: string;
  readonly valve: '' | Valve;
  readonly place_index: number | null;
}

/** A row with what the server thought of it when it came. */
export type Noted<R extends Captured> = R & {
  readonly note?: string | undefined;
  readonly batch: number;
};

/** Everything recorded in the bay of one inspection. */
export interface RecordedRows {
  readonly readings: readonly Noted<ReadingRow>[];
  readonly zeros: readonly Noted<ZeroRow>[];
  readonly remarks: readonly Noted<RemarkRow>[];
}

type Note = { readonly standing_reason: string | null; readonly batch: number };

/** By the server's clock: the device's own, and how far it was off. */
const captured = (row: Row & Note) => ({
  id: row.id,
  takenBy: row.taken_by,
  occurredAt: new Date(new Date(row.occurred_at).getTime() + row.clock_offset_ms).toISOString(),
  standing: row.standing,
  batch: row.batch,
  ...(row.standing_reason === null ? {} : { note: row.standing_reason }),
});

const placeOf = ({ bank, cylinder, valve, place_index }: AtPlace): Place => ({
  bank,
  cylinder,
  valve,
  ...(place_index === null ? {} : { index: place_index }),
});

const of = <R extends Row>(rows: readonly R[], inspectionId: string): readonly R[] =>
  rows.filter((row) => row.inspection_id === inspectionId);

const COMMON =
  'id, inspection_id, taken_by, occurred_at, clock_offset_ms, standing, standing_reason, batch' as const;

type ReadingColumns = Row &
  Note &
  AtPlace & {
    readonly quantity: ReadingRow['quantity'];
    readonly depth: string;
    readonly axis: string;
    readonly repeat: number;
    readonly set_number: number;
    readonly method: ReadingRow['method'];
    readonly gauge_id: string;
    readonly zero_run_id: string | null;
    readonly value_text: string;
    readonly value_unit: string;
    readonly temperatures: LoggedTemperatures;
    readonly reference_part: string | null;
  };

type ZeroColumns = Row &
  Note & {
    readonly run_id: string;
    readonly kind: ZeroRow['kind'];
    readonly gauge_id: string;
    readonly zeroed_on: ZeroRow['zeroedOn'];
    readonly ring_id: string | null;
    readonly size_text: string | null;
    readonly size_unit: string | null;
    readonly reading_text: string;
    readonly reading_unit: string;
  };

type RemarkColumns = Row &
  Note &
  AtPlace & {
    readonly kind: RemarkRow['kind'];
    readonly reading_id: string | null;
    readonly subject: string;
    readonly answer: { readonly value?: string };
    readonly reason: string;
  };

/** The rows of one inspection as the domain assesses them; struck ones and those only received included. */
export const readRows = async (
  em: EntityManager,
  seriesId: string,
  inspectionId: string,
): Promise<RecordedRows> => (await readRowsOf(em, seriesId, [inspectionId]))(inspectionId);

/** The same of several inspections, read together: their rows by the inspection's id. */
export const readRowsOf = async (
  em: EntityManager,
  seriesId: string,
  inspectionIds: readonly string[],
): Promise<(inspectionId: string) => RecordedRows> => {
  const from = (table: string, columns: string) =>
    `select ${COMMON}, ${columns} from record.${table}
     where series_id = ? and inspection_id = any(?::uuid[]) order by batch, occurred_at, id`;
  const key = [seriesId, `{${inspectionIds.join(',')}}`];
  const readings = await em.execute<ReadingColumns[]>(
    from(
      'reading',
      'quantity, bank, cylinder, valve, place_index, depth, axis, repeat, set_number, method, gauge_id, zero_run_id, value_text, value_unit, temperatures, reference_part',
    ),
    key,
  );
  const zeros = await em.execute<ZeroColumns[]>(
    from(
      'zero',
      'run_id, kind, gauge_id, zeroed_on, ring_id, size_text, size_unit, reading_text, reading_unit',
    ),
    key,
  );
  const remarks = await em.execute<RemarkColumns[]>(
    from('remark', 'kind, reading_id, bank, cylinder, valve, place_index, subject, answer, reason'),
    key,
  );
  return (inspectionId) => ({
    readings: of(readings, inspectionId).map((row) => ({
      ...captured(row),
      quantity: row.quantity,
      place: placeOf(row),
      depth: row.depth,
      axis: row.axis,
      repeat: row.repeat,
      set: row.set_number,
      method: row.method,
      gaugeId: row.gauge_id,
      ...(row.zero_run_id === null ? {} : { zeroRunId: row.zero_run_id }),
      value: { text: row.value_text, unit: row.value_unit },
      temperatures: row.temperatures,
      ...(row.reference_part === null ? {} : { referencePart: row.reference_part }),
    })),
    zeros: of(zeros, inspectionId).map((row) => ({
      ...captured(row),
      runId: row.run_id,
      kind: row.kind,
      gaugeId: row.gauge_id,
      zeroedOn: row.zeroed_on,
      ...(row.ring_id === null ? {} : { ringId: row.ring_id }),
      ...(row.size_text === null || row.size_unit === null
        ? {}
        : { size: { text: row.size_text, unit: row.size_unit } }),
      reading: { text: row.reading_text, unit: row.reading_unit },
    })),
    remarks: of(remarks, inspectionId).map((row) => ({
      ...captured(row),
      kind: row.kind,
      ...(row.reading_id === null ? {} : { readingId: row.reading_id }),
      place: placeOf(row),
      subject: row.subject,
      answer: row.answer,
      reason: row.reason,
    })),
  });
};
