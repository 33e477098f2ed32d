import { judgeReadings } from '@/domain/inspection/capture/readings-that-count';
import { positionKey } from '@/domain/inspection/capture/rows';
import type { SheetRows } from './recorded';

/**
 * The rows without what an earlier set read at a bore, for whoever takes an independent one: neither its
 * numbers nor anything worked out from them is left.
 */
export const hideFirst = <R extends SheetRows>(rows: R, bore: string, set: number): R => {
  const hidden = new Set(
    judgeReadings(rows.readings, rows.remarks)
      .filter(({ row, place }) => row.set < set && positionKey(place, 'bore') === bore)
      .map(({ row }) => row.id),
  );
  return { ...rows, readings: rows.readings.filter((row) => !hidden.has(row.id)) };
};
