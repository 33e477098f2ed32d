import { normalCdf } from '../../statistics/distribution';

/** A population of parts and a measurement of them, both normal, in one unit (JCGM 106:2012, 9). */
export interface Population {
  readonly mean: number;
  readonly standardDeviation: number;
  readonly measurementUncertainty: number;
  readonly tolerance: readonly [number, number];
  /** The values that are accepted. */
  readonly acceptance: readonly [number, number];
}

export interface Risk {
  /** Accepted though it does not conform, as a part of all. */
  readonly consumer: number;
  /** Rejected though it conforms, as a part of all. */
  readonly producer: number;
  /** Not conforming, as a part of the accepted. */
  readonly amongAccepted: number;
}

/** What a decision rule lets through, and what it turns away, over many parts. Global risks, 9.5. */
export const globalRisk = (population: Population): Risk => {
  const { mean, standardDeviation: s, measurementUncertainty: u, acceptance } = population;
  const [low, high] = population.tolerance;
  const accepted = (y: number): number =>
    normalCdf((acceptance[1] - y) / u) - normalCdf((acceptance[0] - y) / u);
  const density = (y: number): number =>
    Math.exp(-(((y - mean) / s) ** 2) / 2) / (s * Math.sqrt(2 * Math.PI));
  const both = (y: number): number => density(y) * accepted(y);
  const ends = [mean - REACH * s, low, high, mean + REACH * s];
  const [below = 0, inside = 0, above = 0] = [0, 1, 2].map((i) =>
    simpson(both, ends[i] ?? mean, ends[i + 1] ?? mean),
  );
  const conforming = normalCdf((high - mean) / s) - normalCdf((low - mean) / s);
  return {
    consumer: below + above,
    producer: conforming - inside,
    amongAccepted: (below + above) / (below + inside + above),
  };
};

// Nine standard deviations leave less than 1e-18 outside.
const REACH = 9;
const PANELS = 2000;

const simpson = (f: (x: number) => number, from: number, to: number): number => {
  if (to <= from) return 0;
  const step = (to - from) / PANELS;
  let sum = f(from) + f(to);
  for (let i = 1; i < PANELS; i += 1) sum += f(from + i * step) * (i % 2 === 1 ? 4 : 2);
  return (sum * step) / 3;
};
