import { commonScale, unitsAt } from '../decimal';

/** Readings of a crossed study: appraiser × trial × part, every combination present. */
export type CrossedReadings = readonly (readonly (readonly string[])[])[];

export interface CrossedStudy {
  readonly appraisers: number;
  readonly trials: number;
  readonly parts: number;
  readonly scale: number;
  /** Readings as whole units of 10^−scale, in the given order of indices. */
  readonly units: readonly (readonly (readonly bigint[])[])[];
}

/** What every gauge study reports, as standard deviations; `ndc` is null when the gauge shows no spread. */
export interface GaugeStudy {
  readonly method: 'average-range' | 'anova';
  readonly EV: number;
  readonly AV: number;
  readonly GRR: number;
  readonly PV: number;
  readonly TV: number;
  readonly ndc: number | null;
}

/** Takes the readings exactly; throws on a ragged table (the boundary checks the shape first). */
export function crossedStudy(readings: CrossedReadings): CrossedStudy {
  const appraisers = readings.length;
  const trials = readings[0]?.length ?? 0;
  const parts = readings[0]?.[0]?.length ?? 0;
  const even = readings.every(
    (trial) => trial.length === trials && trial.every((row) => row.length === parts),
  );
  if (!even || appraisers < 2 || trials < 2 || parts < 2) {
    throw new RangeError('a crossed study needs two or more of each and no gaps');
  }
  const scale = commonScale(readings.flat(2));
  const units = readings.map((a) => a.map((row) => row.map((text) => unitsAt(text, scale))));
  return { appraisers, trials, parts, scale, units };
}

/** Number of distinct categories: 1.41 PV/GRR cut to a whole number, at least 1 (AIAG MSA 4th ed.). */
export const distinctCategories = (pv: number, grr: number): number | null =>
  grr === 0 ? null : Math.max(1, Math.floor((1.41 * pv) / grr));

export const sum = (values: readonly bigint[]): bigint => values.reduce((a, x) => a + x, 0n);

/** Largest less smallest of one value or more. */
export function range(values: readonly bigint[]): bigint {
  let [low = 0n, high = 0n] = [values[0], values[0]];
  for (const x of values) {
    if (x < low) low = x;
    if (x > high) high = x;
  }
  return high - low;
}
