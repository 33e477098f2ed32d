import { inTakingOrder, type Place, type ReadingRow, type RemarkRow } from './rows';

/** A reading with what became of it. Every row that was sent is here, once. */
export interface JudgedReading {
  readonly row: ReadingRow;
  /** Where it belongs, after moves. */
  readonly place: Place;
  readonly movedFrom?: Place | undefined;
  readonly state: 'counts' | 'struck' | 'received';
  /** Of a strike. */
  readonly reason?: string | undefined;
}

const once = <R extends { readonly id: string }>(rows: readonly R[]): readonly R[] => [
  ...new Map(rows.map((row) => [row.id, row])).values(),
];

/**
 * Which readings count, in taking order. A strike ends a reading, whenever it came; the last of
 * several moves says where it belongs. What was received and not accepted changes nothing.
 */
export const judgeReadings = (
  readings: readonly ReadingRow[],
  remarks: readonly RemarkRow[],
): readonly JudgedReading[] => {
  const accepted = inTakingOrder(once(remarks)).filter((row) => row.standing === 'accepted');
  const last = (kind: 'strike' | 'move') =>
    new Map(accepted.filter((row) => row.kind === kind).map((row) => [row.readingId, row]));
  const strikes = last('strike');
  const moves = last('move');
  return inTakingOrder(once(readings)).map((row): JudgedReading => {
    const move = moves.get(row.id);
    const moved =
      move === undefined ? { place: row.place } : { place: move.place, movedFrom: row.place };
    const strike = strikes.get(row.id);
    if (row.standing === 'received') return { row, ...moved, state: 'received' };
    return strike === undefined
      ? { row, ...moved, state: 'counts' }
      : { row, ...moved, state: 'struck', reason: strike.reason };
  });
};

export const readingsThatCount = (
  readings: readonly ReadingRow[],
  remarks: readonly RemarkRow[],
): readonly JudgedReading[] =>
  judgeReadings(readings, remarks).filter((reading) => reading.state === 'counts');
