import { scaledQuotient } from '../decimal';
import {
  type CrossedReadings,
  crossedStudy,
  distinctCategories,
  type GaugeStudy,
  range,
  sum,
} from './crossed-study';
import { k1, kOfOneRange } from './range-constants';

export interface AverageRange extends GaugeStudy {
  readonly method: 'average-range';
  /** Mean range of each appraiser, and over all. */
  readonly meanRanges: readonly number[];
  readonly meanRange: number;
  /** Largest difference between appraisers' averages. */
  readonly appraiserDifference: number;
  /** Range of the parts' averages. */
  readonly partRange: number;
  readonly constants: { readonly K1: number; readonly K2: number; readonly K3: number };
}

/** Gauge repeatability and reproducibility, average-and-range method (AIAG MSA 4th ed., ch. III sec. B). */
export function averageRange(readings: CrossedReadings): AverageRange {
  const { appraisers, trials, parts, scale, units } = crossedStudy(readings);
  const partIndex = Array.from({ length: parts }, (_, part) => part);
  const column = (trial: readonly (readonly bigint[])[], part: number) =>
    trial.map((row) => row[part] ?? 0n);
  const ranges = units.map((trial) => sum(partIndex.map((part) => range(column(trial, part)))));
  const appraiserTotals = units.map((trial) => sum(trial.flat()));
  const partTotals = partIndex.map((part) => sum(units.flatMap((trial) => column(trial, part))));

  const meanRange = scaledQuotient(sum(ranges), BigInt(parts * appraisers), scale);
  const appraiserDifference = scaledQuotient(range(appraiserTotals), BigInt(parts * trials), scale);
  const partRange = scaledQuotient(range(partTotals), BigInt(appraisers * trials), scale);
  const constants = {
    K1: k1(trials, parts * appraisers),
    K2: kOfOneRange(appraisers),
    K3: kOfOneRange(parts),
  };
  const EV = meanRange * constants.K1;
  const square = (appraiserDifference * constants.K2) ** 2 - EV ** 2 / (parts * trials);
  const AV = Math.sqrt(Math.max(0, square));
  const GRR = Math.hypot(EV, AV);
  const PV = partRange * constants.K3;
  return {
    method: 'average-range',
    EV,
    AV,
    GRR,
    PV,
    TV: Math.hypot(GRR, PV),
    ndc: distinctCategories(PV, GRR),
    meanRanges: ranges.map((total) => scaledQuotient(total, BigInt(parts), scale)),
    meanRange,
    appraiserDifference,
    partRange,
    constants,
  };
}
