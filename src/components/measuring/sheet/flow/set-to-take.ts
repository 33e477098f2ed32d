import type { JudgedReading } from '@/domain/inspection/capture/readings-that-count';
import type { BorePosition } from '@/domain/tappet/layout/bore-layout';
import { cellsFor, type Part } from '../parts';
import { placeOf, samePlace } from '../sheet';
import { isComplete, takenAt } from './taken';

interface Here {
  readonly judged: readonly JudgedReading[];
  readonly part: Part;
  readonly position: BorePosition;
}

const full = (part: Part) => cellsFor(part, 'full');

const lastSet = ({ judged, part, position }: Here): number => {
  const place = placeOf(position, part.per);
  const sets = judged
    .filter(
      ({ row, state, place: at }) =>
        state === 'counts' && row.quantity === part.quantity && samePlace(at, place),
    )
    .map(({ row }) => row.set);
  return Math.max(1, ...sets);
};

const isBegun = ({ judged, part, position }: Here, set: number): boolean =>
  set > 1 && !isComplete(judged, part, position, set, full);

/** The independent set that is taken next here: one that was begun and left, else one more than there are. */
export const setToTake = (here: Here): number => {
  const last = lastSet(here);
  return isBegun(here, last) ? last : last + 1;
};

/** An independent set that somebody is in the middle of: half of it is shown beside no other. */
export const begunSet = (
  here: Here & { readonly whose: (row: JudgedReading['row']) => string | undefined },
): { set: number; taken: number; of: number; by: string | undefined } | undefined => {
  const set = lastSet(here);
  if (!isBegun(here, set)) return undefined;
  const readings = [...takenAt(here.judged, here.part, here.position, set).values()];
  const by = readings.map(({ row }) => here.whose(row)).find((name) => name !== undefined);
  return { set, taken: readings.length, of: full(here.part).length, by };
};
