import { quantityOf } from '../quantity/quantity';
import { add, compare, type Rational, sub } from '../quantity/rational';
import type { Length } from './bore-sheet';

/** What the class says about a remedy; `null`: its rules do not say, so ask before any work. */
export interface RemediesAllowed {
  readonly anotherLifter: boolean | null;
  readonly bush: boolean | null;
  readonly nextSize: boolean | null;
}

export interface BoreOutside {
  readonly smallestBore: Length;
  readonly largestBore: Length;
  /** Of the lifter that goes back into a bushed bore. */
  readonly smallestLifter: Length;
  readonly largestLifter: Length;
  /** The window of the clearance, both ends. */
  readonly min: Length;
  readonly max: Length;
  readonly nominalSizes: readonly Length[];
  readonly allowed: RemediesAllowed;
}

export interface Remedy {
  readonly kind: 'another-lifter' | 'bush-back' | 'next-nominal-size';
  readonly allowed: boolean | null;
  /** Diameters to look for or to finish to; `null` when none serves. */
  readonly from: Length | null;
  readonly to: Length | null;
  /** Of the next nominal size. */
  readonly nominal?: Length;
  readonly words: string;
  readonly caution: string;
}

/**
 * Ways to bring a bore back into its window, each with the size it needs and whether the class allows
 * it. Common practice; sizes are exact: a bore must clear the largest lifter by the minimum and the
 * smallest by the maximum.
 */
export const remediesFor = (bore: BoreOutside): readonly Remedy[] => {
  const { min, max, largestLifter, smallestLifter, allowed } = bore;
  const length = (value: Rational): Length => quantityOf('length', value, min.unit);
  const span = (from: Rational, to: Rational) =>
    compare(from, to) > 0 ? { from: null, to: null } : { from: length(from), to: length(to) };
  const lifter = span(
    sub(bore.largestBore.value, max.value),
    sub(bore.smallestBore.value, min.value),
  );
  const bushedTo = span(add(largestLifter.value, min.value), add(smallestLifter.value, max.value));
  return [
    {
      kind: 'another-lifter',
      allowed: allowed.anotherLifter,
      ...lifter,
      words:
        lifter.from === null
          ? 'No lifter serves: the bore’s own form is more than the window.'
          : 'Select or try another lifter of a diameter in this range.',
      caution:
        'A run-in flat tappet stays with its lobe: another lifter only new, on a new cam, and run in.',
    },
    {
      kind: 'bush-back',
      allowed: allowed.bush,
      ...bushedTo,
      words: 'Bush the bore and finish it to this size for the lifter measured.',
      caution: 'A bushing moves the bore: true it to the block, and open its oil hole.',
    },
    ...nextSize(bore, length),
  ];
};

const nextSize = (bore: BoreOutside, length: (value: Rational) => Length): readonly Remedy[] => {
  const next = bore.nominalSizes
    .filter((size) => compare(add(size.value, bore.min.value), bore.largestBore.value) > 0)
    .reduce<Length | null>(
      (best, size) => (best === null || compare(size.value, best.value) < 0 ? size : best),
      null,
    );
  if (next === null) return [];
  return [
    {
      kind: 'next-nominal-size',
      allowed: bore.allowed.nextSize,
      nominal: next,
      from: length(add(next.value, bore.min.value)),
      to: length(add(next.value, bore.max.value)),
      words:
        'Open the bore to the next nominal size with larger lifters; this is its finished size for a lifter of exactly that size.',
      caution:
        'Measure the new lifters first: they run over nominal, and the bore follows the lifter.',
    },
  ];
};
