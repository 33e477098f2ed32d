import type { JudgedReading } from '@/domain/inspection/capture/readings-that-count';
import { type BorePosition, boreName } from '@/domain/tappet/layout/bore-layout';
import { cellKey, cellsOf, type Part } from './parts';
import { placeOf, samePlace } from './sheet';

/** The readings of one part at one position in one set that count, the last of each cell. */
export const takenAt = (
  judged: readonly JudgedReading[],
  part: Part,
  position: BorePosition,
  set: number,
): ReadonlyMap<string, JudgedReading> => {
  const place = placeOf(position, part.per);
  return new Map(
    judged
      .filter(
        ({ row, state, place: at }) =>
          state === 'counts' &&
          row.quantity === part.quantity &&
          row.set === set &&
          samePlace(at, place),
      )
      .map((reading) => [cellKey(reading.row), reading]),
  );
};

export const isComplete = (
  judged: readonly JudgedReading[],
  part: Part,
  position: BorePosition,
  set: number,
): boolean => {
  const taken = takenAt(judged, part, position, set);
  return cellsOf(part).every((cell) => taken.has(cellKey(cell)));
};

/** The first cell with nothing in it; none when the set is complete. */
export const nextCell = (part: Part, taken: ReadonlyMap<string, unknown>): string | undefined =>
  cellsOf(part)
    .map(cellKey)
    .find((key) => !taken.has(key));

/** The position after this one that still lacks readings of the part; each cylinder or engine once. */
export const nextPosition = (
  judged: readonly JudgedReading[],
  part: Part,
  positions: readonly BorePosition[],
  from: string,
  outOfReach: ReadonlySet<string>,
): BorePosition | undefined => {
  if (part.per === 'engine' || part.per === 'car') return undefined;
  const at = positions.findIndex((position) => boreName(position) === from);
  const round = [...positions.slice(at + 1), ...positions.slice(0, at)];
  return round.find(
    (position) => !outOfReach.has(boreName(position)) && !isComplete(judged, part, position, 1),
  );
};
