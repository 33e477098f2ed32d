import { mean, type Series } from '../measurement/series';
import type { Rational } from '../quantity/rational';
import type { Corrected } from './dial';

/** One place in a bore (a depth on an axis) with its true repeats. */
export interface Place {
  readonly depth: string;
  readonly axis: string;
  readonly repeats: Series;
  /** Mean of the repeats: the bore at this place. */
  readonly value: Rational;
}

/** Readings of the same depth and axis are repeats of one place; places keep the order of first reading. */
export const placesOf = (readings: readonly Corrected[]): readonly Place[] => {
  const groups = new Map<string, { depth: string; axis: string; repeats: Rational[] }>();
  for (const { depth, axis, value } of readings) {
    const key = `${depth}\n${axis}`;
    const group = groups.get(key);
    if (group === undefined) groups.set(key, { depth, axis, repeats: [value] });
    else group.repeats.push(value);
  }
  return [...groups.values()].map(({ depth, axis, repeats }) => ({
    depth,
    axis,
    repeats,
    value: repeats.length === 1 ? (repeats[0] as Rational) : mean(repeats),
  }));
};

interface Placed {
  readonly depth: string;
  readonly axis: string;
}

const unlike = (names: readonly string[]): readonly string[] =>
  names.filter((name, at) => names.indexOf(name) === at);

/** Each depth once, in the order of first reading. */
export const depthsOf = (places: readonly Placed[]): readonly string[] =>
  unlike(places.map((place) => place.depth));

/** Each axis once, in the order of first reading. */
export const axesOf = (places: readonly Placed[]): readonly string[] =>
  unlike(places.map((place) => place.axis));
