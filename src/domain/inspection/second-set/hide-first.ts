import { judgeReadings } from '../capture/readings-that-count';
import { positionKey, type ReadingRow, type RemarkRow } from '../capture/rows';
import type { SecondAsked } from './asked';

/**
 * The rows without what earlier sets read at the bores of an independent one, for whoever takes it:
 * neither their numbers nor anything worked out from them is left.
 */
export const hideFirst = <
  R extends { readonly readings: readonly ReadingRow[]; readonly remarks: readonly RemarkRow[] },
>(
  rows: R,
  { bores, set }: SecondAsked,
): R => {
  const hidden = new Set(
    judgeReadings(rows.readings, rows.remarks)
      .filter(({ row, place }) => row.set < set && bores.includes(positionKey(place, 'bore')))
      .map(({ row }) => row.id),
  );
  return { ...rows, readings: rows.readings.filter((row) => !hidden.has(row.id)) };
};
