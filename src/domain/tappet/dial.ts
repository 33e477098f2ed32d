import type { LargerReads } from '../measurement/gauge';
import { add, div, negate, type Rational, rational, sub, zero } from '../quantity/rational';
import type { BoreSheet, PlaceReading, Zeros } from './bore-sheet';

/** A reading that was taken, freed from drift and in the part's own direction: larger is more. */
export interface Corrected {
  readonly depth: string;
  readonly axis: string;
  readonly value: Rational;
}

/** How far the zero moved over the run; `undefined` without both zeros. */
export const driftOf = (zeros: Zeros | undefined): Rational | undefined =>
  zeros?.opening === undefined || zeros.closing === undefined
    ? undefined
    : sub(zeros.closing.value, zeros.opening.value);

/**
 * For reading i of n in taking order: reading − (opening + (closing − opening)·i ÷ (n + 1)), and then
 * the sign of the dial's direction.
 */
export const corrector = (
  n: number,
  zeros: Zeros | undefined,
  largerReads: LargerReads,
): ((reading: Rational, i: number) => Rational) => {
  const opening = zeros?.opening?.value ?? zero;
  const step = div(driftOf(zeros) ?? zero, rational(BigInt(n + 1)));
  const still = opening.n === 0n && step.n === 0n;
  return (reading, i) => {
    const freed = still
      ? reading
      : sub(reading, add(opening, { n: step.n * BigInt(i), d: step.d }));
    return largerReads === 'minus' ? negate(freed) : freed;
  };
};

const taken = (
  place: PlaceReading,
): place is PlaceReading & { readonly reading: NonNullable<PlaceReading['reading']> } =>
  place.reading !== null;

/** Every reading that was taken, corrected. A gauge of diameters has no direction to turn. */
export const correctedReadings = (sheet: BoreSheet): readonly Corrected[] => {
  const readings = sheet.bore.filter(taken);
  const n = Math.max(
    sheet.zeros?.readingsInRun ?? readings.length,
    ...readings.map((place) => place.order ?? 0),
  );
  const direction = sheet.method === 'comparative' ? (sheet.gauge?.largerReads ?? 'plus') : 'plus';
  const correct = corrector(n, sheet.zeros, direction);
  return readings.map(({ depth, axis, reading, order }, at) => ({
    depth,
    axis,
    value: correct(reading.value, order ?? at + 1),
  }));
};
