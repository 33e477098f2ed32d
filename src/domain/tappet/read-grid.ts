import type { Fault } from '../failure';
import { parseQuantity } from '../quantity/parse';
import { fail, ok, type Result } from '../result';
import type { PlaceReading } from './bore-sheet';

/** depth × axis, each cell one reading or a list of true repeats; an empty cell was not read. */
export type Grid = readonly (readonly (string | readonly string[])[])[];

/**
 * Reads a grid as sent. Depths and axes are named "depth 1", "axis 1" from the top unless names are
 * given; `order` holds each reading's place in the taking order, cell by cell as listed. Faults point at
 * the cell.
 */
export const readGrid = (
  grid: Grid,
  unit: string,
  options: {
    readonly order?: readonly number[] | undefined;
    readonly depths?: readonly string[] | undefined;
    readonly axes?: readonly string[] | undefined;
  } = {},
): Result<readonly PlaceReading[], readonly Fault[]> => {
  const faults: Fault[] = [];
  const readings: PlaceReading[] = [];
  grid.forEach((row, depthAt) => {
    row.forEach((cell, axisAt) => {
      const repeats = typeof cell === 'string' ? [cell] : cell;
      repeats.forEach((text, repeatAt) => {
        const depth = options.depths?.[depthAt] ?? `depth ${depthAt + 1}`;
        const axis = options.axes?.[axisAt] ?? `axis ${axisAt + 1}`;
        const order = options.order?.[readings.length];
        if (text.trim() === '') {
          readings.push({ depth, axis, order, reading: null });
          return;
        }
        const read = parseQuantity(text, { dimension: 'length', defaultUnit: unit });
        if (read.ok) readings.push({ depth, axis, order, reading: read.value });
        else {
          const at = typeof cell === 'string' ? '' : `/${repeatAt}`;
          faults.push({ pointer: `/${depthAt}/${axisAt}${at}`, detail: read.failure.detail });
        }
      });
    });
  });
  return faults.length === 0 ? ok(readings) : fail(faults);
};
