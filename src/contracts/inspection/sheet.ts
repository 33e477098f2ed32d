import * as z from 'zod/mini';
import type { GaugeRecord } from '@/domain/inspection/capture/gauge-record';
import type { ReadingRow, RemarkRow, ZeroRow } from '@/domain/inspection/capture/rows';
import type { InspectionState } from '@/domain/inspection/state';
import type { Written } from '@/domain/quantity/dimension';

const row = z.looseObject({
  id: z.string(),
  takenBy: z.string(),
  occurredAt: z.string(),
  standing: z.enum(['accepted', 'received']),
  /** Number of the batch it came with. */
  batch: z.int(),
});

/** Whether an answer is a sheet; the rows in it have the fields in which they were sent. */
export const sheetNow = z.looseObject({
  batch: z.int(),
  state: z.string(),
  correcting: z.boolean(),
  rows: z.looseObject({
    readings: z.array(row),
    zeros: z.array(row),
    remarks: z.array(row),
  }),
  gauges: z.array(z.looseObject({ id: z.string(), code: z.string(), name: z.string() })),
  people: z.record(z.string(), z.string()),
});

/** A sheet in the bay as the server has it: every tablet on it works from the same rows. */
export interface SheetNow {
  /** Batches in the inspection's chain so far. */
  readonly batch: number;
  readonly state: InspectionState;
  /** A signed report is open for correction. */
  readonly correcting: boolean;
  readonly rows: {
    readonly readings: readonly ReadingRow[];
    readonly zeros: readonly ZeroRow[];
    readonly remarks: readonly RemarkRow[];
  };
  readonly gauges: readonly (GaugeRecord & {
    readonly name: string;
    readonly size?: Written | undefined;
  })[];
  /** Names by the id that stands in `takenBy`. */
  readonly people: Readonly<Record<string, string>>;
}

/** Reads an answer; nothing where it is none, as from a page that asks for a sign-in. */
export const readSheetNow = (answer: unknown): SheetNow | undefined => {
  const read = sheetNow.safeParse(answer);
  return read.success ? (read.data as unknown as SheetNow) : undefined;
};
