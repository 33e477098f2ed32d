import { largest, mean, type Series, smallest } from '../measurement/series';
import { add, type Rational, sub, zero } from '../quantity/rational';
import type { BoreSheet } from './bore-sheet';
import type { Place } from './places';

export interface Clearance {
  /** Mean bore − mean lifter. */
  readonly mean: Rational;
  /** Smallest bore − largest lifter. */
  readonly min: Rational;
  /** Largest bore − smallest lifter. */
  readonly max: Rational;
}

/** Bore and lifter diameters on one footing, as they are now. */
export interface Diameters {
  readonly bores: Series;
  readonly lifters: Series;
  /** False where only their difference is known: comparative, on a lifter whose size was not given. */
  readonly sizesKnown: boolean;
}

/**
 * Comparative with a zero of size S: bore = S + corrected reading. Without S the zero is this lifter at
 * its widest, so the corrected reading is the smallest clearance at that place: bore = widest lifter +
 * reading, or, where the lifter's size was not given, the reading over a lifter of zero. `null` without
 * a bore reading, or without a lifter where its size is needed.
 */
export const diametersOf = (sheet: BoreSheet, places: readonly Place[]): Diameters | null => {
  const read = places.map((place) => place.value);
  const lifters = sheet.lifter.map((lifter) => lifter.value);
  if (read.length === 0) return null;
  const onLifter = sheet.method === 'comparative' && sheet.zeroSize === undefined;
  if (lifters.length === 0)
    return onLifter ? { bores: read, lifters: [zero], sizesKnown: false } : null;
  const from = onLifter ? largest(lifters) : (sheet.zeroSize?.value ?? zero);
  const shift = sheet.method === 'comparative' ? from : zero;
  return { bores: read.map((reading) => add(shift, reading)), lifters, sizesKnown: true };
};

export const clearanceOf = (bores: Series, lifters: Series): Clearance => ({
  mean: sub(mean(bores), mean(lifters)),
  min: sub(smallest(bores), largest(lifters)),
  max: sub(largest(bores), smallest(lifters)),
});
