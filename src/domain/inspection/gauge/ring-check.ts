import { wallTimeAt } from '../../deadline/zone';
import type { Dimension, Written } from '../../quantity/dimension';
import { findUnit } from '../../quantity/find-unit';
import { minus, type Quantity, quantityOf } from '../../quantity/quantity';
import { compare, rational, sub } from '../../quantity/rational';
import { fromStored } from '../../quantity/stored';
import { writtenWords } from '../../rulebook/describe';

/** A gauge checked on a ring of the series: when, on which, and the largest difference that it read. */
export interface RingCheck {
  readonly id: string;
  /** ISO 8601 instant in UTC. */
  readonly at: string;
  /** The ring's code. */
  readonly ring: string;
  /** Read less expected, with its sign. */
  readonly difference: Written;
}

const ZERO = rational(0n);

/** How far from a reading a check still counts as of that night, before it or after. Common practice. */
export const SAME_NIGHT_HOURS = 12;

const sizeOf = <D extends Dimension>(quantity: Quantity<D>): Quantity<D> =>
  compare(quantity.value, ZERO) < 0
    ? quantityOf(quantity.dimension, sub(ZERO, quantity.value), quantity.unit)
    : quantity;

/** Of what was read less what was expected, exactly: the difference that is largest in size. */
export const largestDifference = (
  readings: readonly Written[],
  expected: Written,
): Quantity<'length'> => {
  const wanted = fromStored(expected, 'length');
  const differences = readings.map((reading) => minus(fromStored(reading, 'length'), wanted));
  const [first, ...others] = differences;
  if (first === undefined) throw new RangeError('A check has at least one reading.');
  return others.reduce(
    (worst, one) => (compare(sizeOf(one).value, sizeOf(worst).value) > 0 ? one : worst),
    first,
  );
};

/** Whether a difference, whatever its sign, is no more than what is allowed; equal is allowed. */
export const isAllowed = (difference: Quantity<'length'>, allowed: Quantity<'length'>): boolean =>
  compare(sizeOf(difference).value, allowed.value) <= 0;

/** The checks of the night of a reading; all of them count, the worst decides. */
export const checksOfTheNight = (
  checks: readonly RingCheck[],
  takenAt: string,
): readonly RingCheck[] =>
  checks.filter(
    ({ at }) => Math.abs(Date.parse(at) - Date.parse(takenAt)) <= SAME_NIGHT_HOURS * 3_600_000,
  );

const clock = (zone: string, at: string): string => {
  const { hour, minute } = wallTimeAt(zone, Date.parse(at));
  return [hour, minute].map((part) => String(part).padStart(2, '0')).join(':');
};

/** What the checks of a night come to: the largest difference, and the words for a finding. */
export interface CheckedOnRing {
  readonly off: Quantity<'length'>;
  /** `gauge DB-07 checked on the ring SR-03 at 21:10, off by 0.0000 in` */
  readonly words: string;
}

export const worstOf = (
  code: string,
  checks: readonly RingCheck[],
  zone: string,
): CheckedOnRing | undefined => {
  const known = checks.filter(({ difference }) => findUnit('length', difference.unit));
  const [first, ...others] = known.map((check) => ({
    check,
    off: sizeOf(fromStored(check.difference, 'length')),
  }));
  if (first === undefined) return undefined;
  const worst = others.reduce(
    (most, one) => (compare(one.off.value, most.off.value) > 0 ? one : most),
    first,
  );
  const { at, ring } = worst.check;
  return {
    off: worst.off,
    words: `gauge ${code} checked on the ring ${ring} at ${clock(zone, at)}, off by ${writtenWords(worst.off)}`,
  };
};
