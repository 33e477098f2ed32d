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
  return [...groups.values()].map((group) => ({
    ...group,
    value: group.repeats.length === 1 ? (group.repeats[0] as Rational) : mean(group.repeats),
  }));
};

export const depthsOf = (places: readonly Place[]): readonly string[] => [
  ...new Set(places.map((place) => place.depth)),
];

export const axesOf = (places: readonly Place[]): readonly string[] => [
  ...new Set(places.map((place) => place.axis)),
];
