import type { SentRow } from '@/contracts/inspection/rows';
import type { ReadingRow, RemarkRow, ZeroRow } from '@/domain/inspection/capture/rows';
import type { QuantityName } from '@/domain/rulebook/quantity-catalogue';

/** The rows that a sheet works on: the server's, and those that are only on this device yet. */
export interface SheetRows {
  readonly readings: readonly ReadingRow[];
  readonly zeros: readonly ZeroRow[];
  readonly remarks: readonly RemarkRow[];
}

const common = (row: SentRow, takenBy: string, offsetMs: number) => ({
  id: row.id,
  takenBy,
  occurredAt: new Date(Date.parse(row.occurredAt) + offsetMs).toISOString(),
  standing: 'accepted' as const,
});

/** A row as sent, as the server will give it back once it is accepted. */
const recorded = (rows: readonly SentRow[], takenBy: string, offsetMs: number): SheetRows => ({
  readings: rows.flatMap((row): readonly ReadingRow[] =>
    row.kind === 'reading'
      ? [
          {
            ...common(row, takenBy, offsetMs),
            quantity: row.quantity as QuantityName,
            place: row.place,
            depth: row.depth,
            axis: row.axis,
            repeat: row.repeat,
            set: row.set,
            method: row.method,
            gaugeId: row.gaugeId,
            zeroRunId: row.zeroRunId,
            value: row.value,
            temperatures: row.temperatures,
            ...(row.referencePart === undefined ? {} : { referencePart: row.referencePart }),
          },
        ]
      : [],
  ),
  zeros: rows.flatMap((row): readonly ZeroRow[] =>
    row.kind === 'zero'
      ? [
          {
            ...common(row, takenBy, offsetMs),
            runId: row.runId,
            kind: row.end,
            gaugeId: row.gaugeId,
            zeroedOn: row.zeroedOn,
            ringId: row.ringId,
            size: row.size,
            reading: row.reading,
          },
        ]
      : [],
  ),
  remarks: rows.flatMap((row): readonly RemarkRow[] =>
    row.kind === 'remark'
      ? [
          {
            ...common(row, takenBy, offsetMs),
            kind: row.remark,
            readingId: 'readingId' in row ? row.readingId : undefined,
            place: row.place,
            subject: 'subject' in row ? row.subject : '',
            answer: 'value' in row ? { value: row.value } : {},
            reason: row.reason,
          },
        ]
      : [],
  ),
});

const join = <R extends { readonly id: string }>(server: readonly R[], device: readonly R[]) => {
  const known = new Set(server.map((row) => row.id));
  return [...server, ...device.filter((row) => !known.has(row.id))];
};

/** Both together, each row once; the server's word on a row comes first. */
export const joinRows = (
  server: SheetRows,
  device: readonly SentRow[],
  takenBy: string,
  offsetMs: number,
): SheetRows => {
  const own = recorded(device, takenBy, offsetMs);
  return {
    readings: join(server.readings, own.readings),
    zeros: join(server.zeros, own.zeros),
    remarks: join(server.remarks, own.remarks),
  };
};
