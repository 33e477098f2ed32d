import { compare } from '../../quantity/rational';
import type { Doubt, Seen, Show } from '../sheet/plausible';
import { degreeAt, LOBES, lobeOf } from './cam-place';

/** A lift this far from both of its neighbours is a slip of the key, not a lobe; below it, ramps are steep. */
const TIMES = 3;
/** In metres: below a hundredth of an inch a lift may well be a multiple of the one before. */
const RAMP = 0.000_254;

/**
 * Lifts of a cam table that lie off the curve: one that is a multiple or a fraction of both of its
 * neighbours. The bounds are our own: wide enough for coarse steps, tight enough for a lost decimal point.
 */
export const offTheCurve = (seen: readonly Seen[], show: Show): readonly Doubt[] =>
  LOBES.flatMap((lobe) => {
    const points = seen
      .filter(({ cell }) => lobeOf(cell) === lobe)
      .toSorted((a, b) =>
        compare(degreeAt(a.cell.position).value, degreeAt(b.cell.position).value),
      );
    return points.flatMap((point, at): readonly Doubt[] => {
      const [before, after] = [points[at - 1], points[at + 1]];
      if (before === undefined || after === undefined) return [];
      const [low, high] = [before.number, after.number].toSorted((a, b) => a - b) as [
        number,
        number,
      ];
      const off =
        (point.number > RAMP && point.number > TIMES * Math.max(high, RAMP)) ||
        (low > RAMP && point.number < low / TIMES);
      return off
        ? [
            {
              cell: point.cell,
              detail: `${show(point.quantity)} lies off the curve: before it ${show(before.quantity)}, after it ${show(after.quantity)}. Is the decimal point in its place?`,
            },
          ]
        : [];
    });
  });
