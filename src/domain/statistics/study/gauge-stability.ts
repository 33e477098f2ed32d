import { commonScale, scaledQuotient, unitsAt } from '../decimal';

/** d2 for two values as the handbook prints it. */
const D2_OF_TWO = 1.128;

export interface IndividualsChart {
  readonly mean: number;
  readonly meanMovingRange: number;
  readonly lowerLimit: number;
  readonly upperLimit: number;
}

/** Individuals chart of a check standard: mean ± 3 (mean moving range ÷ 1.128) (NIST/SEMATECH 6.3.2.2). */
export function individualsChart(values: readonly string[]): IndividualsChart {
  if (values.length < 2) throw new RangeError('a chart needs two values or more');
  const scale = commonScale(values);
  const units = values.map((text) => unitsAt(text, scale));
  const total = units.reduce((a, x) => a + x, 0n);
  let moving = 0n;
  for (const [i, x] of units.entries()) {
    const step = x - (units[i - 1] ?? x);
    moving += step < 0n ? -step : step;
  }
  const mean = scaledQuotient(total, BigInt(units.length), scale);
  const meanMovingRange = scaledQuotient(moving, BigInt(units.length - 1), scale);
  const width = (3 * meanMovingRange) / D2_OF_TWO;
  return { mean, meanMovingRange, lowerLimit: mean - width, upperLimit: mean + width };
}

export interface GaugeCapability {
  readonly Cg: number;
  readonly Cgk: number;
}

/** Cg = 0.2 T/6s and Cgk = (0.1 T − |x̄ − reference|)/3s; 1.33 is asked of both (VDA 5, procedure 1). */
export function gaugeCapability(
  tolerance: number,
  standardDeviation: number,
  bias: number,
): GaugeCapability {
  return {
    Cg: (0.2 * tolerance) / (6 * standardDeviation),
    Cgk: (0.1 * tolerance - Math.abs(bias)) / (3 * standardDeviation),
  };
}
