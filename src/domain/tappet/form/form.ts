import { largest, mean, range, type Series } from '../../measurement/series';
import { type Rational, sub } from '../../quantity/rational';
import { axesOf, depthsOf, type Place } from '../places';
import { type Shape, shapeOf } from './shape';

export interface Taper {
  /** Range of the depths' means. */
  readonly depthMeans: Rational;
  /** Largest range along one axis. */
  readonly worstAxis: Rational;
  /** Mean at the top less mean at the bottom. */
  readonly signed: Rational;
  readonly shape: Shape;
}

const values = (places: readonly Place[]): Series => places.map((place) => place.value);

/** Largest difference between axes at one depth, in diameter; `null` where no depth has two axes. */
export const outOfRound = (places: readonly Place[]): Rational | null => {
  const ranges = depthsOf(places)
    .map((depth) => places.filter((place) => place.depth === depth))
    .filter((atDepth) => atDepth.length > 1)
    .map((atDepth) => range(values(atDepth)));
  return ranges.length === 0 ? null : largest(ranges);
};

/** `null` with fewer than two depths. `division`: what the shape is told apart by. */
export const taperOf = (places: readonly Place[], division: Rational): Taper | null => {
  const means = depthsOf(places).map((depth) =>
    mean(values(places.filter((place) => place.depth === depth))),
  );
  const [top] = means;
  const bottom = means.at(-1);
  if (top === undefined || bottom === undefined || means.length < 2) return null;
  const alongAxes = axesOf(places).map((axis) =>
    range(values(places.filter((place) => place.axis === axis))),
  );
  return {
    depthMeans: range(means),
    worstAxis: largest(alongAxes),
    signed: sub(top, bottom),
    shape: shapeOf(means, division),
  };
};
