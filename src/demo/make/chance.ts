/** A small repeatable source of chance (mulberry32), so that the demo is the same everywhere. */
export interface Chance {
  /** From 0 up to, not including, 1. */
  next(): number;
  /** A whole number from `from` to `to`, both included. */
  whole(from: number, to: number): number;
  /** Roughly normal, mean 0, standard deviation 1. */
  bell(): number;
}

export const chanceFrom = (seed: number): Chance => {
  let state = seed >>> 0;
  const next = () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 4_294_967_296;
  };
  return {
    next,
    whole: (from, to) => from + Math.floor(next() * (to - from + 1)),
    bell: () => Array.from({ length: 12 }, next).reduce((sum, x) => sum + x, -6),
  };
};
