import { scaledQuotient } from '../decimal';
import { fTail } from '../incomplete-beta';
import {
  type CrossedReadings,
  crossedStudy,
  distinctCategories,
  type GaugeStudy,
  sum,
} from './crossed-study';

/** An interaction less significant than this is pooled with the repeatability (AIAG MSA 4th ed.). */
const POOLING_LEVEL = 0.25;

export interface CrossedAnova extends GaugeStudy {
  readonly method: 'anova';
  readonly interactionSd: number;
  readonly pooled: boolean;
  readonly interactionP: number | null;
  readonly sumsOfSquares: {
    readonly part: number;
    readonly appraiser: number;
    readonly interaction: number;
    readonly repeatability: number;
    readonly total: number;
  };
}

/** Gauge repeatability and reproducibility by two-way analysis of variance (AIAG MSA 4th ed.). */
export function crossedAnova(readings: CrossedReadings): CrossedAnova {
  const { appraisers: k, trials: r, parts: n, scale, units } = crossedStudy(readings);
  const cells = units.map((trial) =>
    Array.from({ length: n }, (_, part) => sum(trial.map((row) => row[part] ?? 0n))),
  );
  const appraiserTotals = cells.map(sum);
  const partTotals = Array.from({ length: n }, (_, part) =>
    sum(cells.map((row) => row[part] ?? 0n)),
  );
  // All sums of squares over the common denominator k·n·r, exactly.
  const common = BigInt(k * n * r);
  const squares = (values: readonly bigint[]) => sum(values.map((x) => x * x));
  const correction = sum(appraiserTotals) ** 2n;
  const total = squares(units.flat(2)) * common - correction;
  const part = squares(partTotals) * BigInt(n) - correction;
  const appraiser = squares(appraiserTotals) * BigInt(k) - correction;
  const within = squares(units.flat(2)) * common - squares(cells.flat()) * BigInt(k * n);
  const interaction = total - part - appraiser - within;
  const ss = (x: bigint) => scaledQuotient(x, common, 2 * scale);

  const dfInteraction = (k - 1) * (n - 1);
  const dfWithin = k * n * (r - 1);
  const msInteraction = ss(interaction) / dfInteraction;
  const msWithin = ss(within) / dfWithin;
  const interactionP =
    within === 0n ? null : fTail(msInteraction / msWithin, dfInteraction, dfWithin);
  const pooled = interactionP !== null && interactionP > POOLING_LEVEL;
  const repeatability = pooled ? ss(within + interaction) / (dfWithin + dfInteraction) : msWithin;
  const error = pooled ? repeatability : msInteraction;

  const variance = (ms: number, below: number, count: number) => Math.max(0, (ms - below) / count);
  const interactionVariance = pooled ? 0 : variance(msInteraction, msWithin, r);
  const AV = Math.sqrt(variance(ss(appraiser) / (k - 1), error, n * r));
  const PV = Math.sqrt(variance(ss(part) / (n - 1), error, k * r));
  const GRR = Math.sqrt(repeatability + AV ** 2 + interactionVariance);
  return {
    method: 'anova',
    EV: Math.sqrt(repeatability),
    AV,
    GRR,
    PV,
    TV: Math.hypot(GRR, PV),
    ndc: distinctCategories(PV, GRR),
    interactionSd: Math.sqrt(interactionVariance),
    pooled,
    interactionP,
    sumsOfSquares: {
      part: ss(part),
      appraiser: ss(appraiser),
      interaction: ss(interaction),
      repeatability: ss(within),
      total: ss(total),
    },
  };
}
