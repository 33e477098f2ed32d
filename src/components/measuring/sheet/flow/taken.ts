import type { JudgedReading } from '@/domain/inspection/capture/readings-that-count';
import type { CellPlace } from '@/domain/inspection/plan/places';
import { type BorePosition, boreName } from '@/domain/tappet/layout/bore-layout';
import { cellKey, type Part } from '../parts';
import { placeOf, samePlace } from '../sheet';

/** The cells that are asked of a part at a position. */
export type Asked = (part: Part, position: BorePosition) => readonly CellPlace[];

/** Whether Enter leads to a position for a part. */
export type Leads = (part: Part, position: BorePosition) => boolean;

/** The readings of one part at one position in one set that count, the last of each cell. */
export const takenAt = (
  judged: readonly JudgedReading[],
  part: Pick<Part, 'quantity' | 'per' | 'reference'>,
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
          (row.referencePart !== undefined) === (part.reference === true) &&
          samePlace(at, place),
      )
      .map((reading) => [
        cellKey({ depth: reading.row.referencePart ?? reading.row.depth, axis: reading.row.axis }),
        reading,
      ]),
  );
};

export const isComplete = (
  judged: readonly JudgedReading[],
  part: Part,
  position: BorePosition,
  set: number,
  asked: Asked,
): boolean => {
  const taken = takenAt(judged, part, position, set);
  return asked(part, position).every((cell) => taken.has(cellKey(cell)));
};

/** The first cell with nothing in it; none when the set is complete. */
export const nextCell = (
  cells: readonly CellPlace[],
  taken: ReadonlyMap<string, unknown>,
): string | undefined => cells.map(cellKey).find((key) => !taken.has(key));

const isWhole = ({ per }: Part) => per === 'engine' || per === 'car';

/** One position for each place of a part: every bore, one of each cylinder, one for the engine. */
const onceEach = (part: Part, positions: readonly BorePosition[]): readonly BorePosition[] => {
  if (isWhole(part)) return positions.slice(0, 1);
  if (part.per === 'bore') return positions;
  return positions.filter(
    ({ cylinder }, at) => positions.findIndex((one) => one.cylinder === cylinder) === at,
  );
};

/** The position after this one that still lacks readings of the part; each cylinder or engine once. */
export const nextPosition = (
  judged: readonly JudgedReading[],
  part: Part,
  positions: readonly BorePosition[],
  from: string,
  outOfReach: ReadonlySet<string>,
  asked: Asked,
  { set = 1, leads = () => true }: { readonly set?: number; readonly leads?: Leads } = {},
): BorePosition | undefined => {
  const at = positions.findIndex((position) => boreName(position) === from);
  const round = [...positions.slice(at + 1), ...positions.slice(0, at + 1)];
  return onceEach(part, round).find(
    (position) =>
      (part.per !== 'bore' || !outOfReach.has(boreName(position))) &&
      leads(part, position) &&
      !isComplete(judged, part, position, set, asked),
  );
};
