import { add, compare, type Rational, sub } from '../quantity/rational';

/** One end of a window; an open end does not itself belong to it. */
export interface End {
  readonly at: Rational;
  readonly closed: boolean;
}

/** The values that comply, in the base of the dimension; an absent end is unbounded. */
export interface Window {
  readonly low?: End | undefined;
  readonly high?: End | undefined;
}

/** Exact: a value equal to a closed end lies inside. */
export const contains = ({ low, high }: Window, value: Rational): boolean => {
  const fromLow = low === undefined ? 1 : compare(value, low.at);
  const toHigh = high === undefined ? 1 : compare(high.at, value);
  return (
    (fromLow > 0 || (fromLow === 0 && low?.closed === true)) &&
    (toHigh > 0 || (toHigh === 0 && high?.closed === true))
  );
};

/** Both ends moved inward by `width`. */
export const narrowed = ({ low, high }: Window, width: Rational): Window => ({
  low: low && { ...low, at: add(low.at, width) },
  high: high && { ...high, at: sub(high.at, width) },
});

/** Both ends moved outward by `width`. */
export const widened = ({ low, high }: Window, width: Rational): Window => ({
  low: low && { ...low, at: sub(low.at, width) },
  high: high && { ...high, at: add(high.at, width) },
});

export const isEmpty = ({ low, high }: Window): boolean =>
  low !== undefined && high !== undefined && compare(low.at, high.at) > 0;

/** True when value ± width touches or crosses an end. */
export const reachesAnEnd = (window: Window, value: Rational, width: Rational): boolean =>
  [window.low, window.high].some(
    (end) =>
      end !== undefined &&
      compare(sub(value, width), end.at) <= 0 &&
      compare(add(value, width), end.at) >= 0,
  );
