import type { BoreSheet, PlaceReading } from '@/domain/tappet/bore-sheet';
import { type BoreMeasurement, measureBore } from '@/domain/tappet/measure-bore';
import { type Grid, readGrid } from '@/domain/tappet/read-grid';
import { inches, typed } from '../quantity/build';

export const grid = (
  cells: Grid,
  unit = 'in',
  order?: readonly number[],
): readonly PlaceReading[] => {
  const read = readGrid(cells, unit, { order });
  if (!read.ok) throw new Error(read.failure.map((fault) => fault.detail).join(' '));
  return read.value;
};

/** A comparative sheet in inches with a dial of 0.0001 in, unless told otherwise. */
export const sheet = (over: Partial<BoreSheet> = {}): BoreSheet => ({
  unit: 'in',
  method: 'comparative',
  lifter: [],
  bore: [],
  gauge: { kind: 'dial-bore-gauge', division: inches('0.0001') },
  ...over,
});

export const clearanceTexts = (measured: BoreMeasurement) =>
  measured.clearance && {
    mean: measured.clearance.mean.text,
    min: measured.clearance.min.text,
    max: measured.clearance.max.text,
  };

/** Mean, min and max of diameters alone. */
export const absoluteTexts = (bore: readonly string[], lifter: readonly string[], unit = 'in') =>
  clearanceTexts(
    measureBore({
      unit,
      method: 'absolute',
      lifter: lifter.map((text) => typed('length', text, unit)),
      bore: grid([bore], unit),
    }),
  );
