import { oneWay } from '../one-way';

export interface Precision {
  readonly mean: number;
  readonly laboratories: number;
  readonly repeatabilitySd: number;
  readonly betweenLaboratorySd: number;
  readonly reproducibilitySd: number;
  /** r = 2.8 s_r and R = 2.8 s_R: two single results should differ by no more, 95 times in 100. */
  readonly repeatabilityLimit: number;
  readonly reproducibilityLimit: number;
}

/**
 * Repeatability and reproducibility by ISO 5725-2:1994, 7.4 (one level, unequal numbers of
 * replicates allowed). A negative between-laboratory variance is set to zero, as the standard says.
 */
export function iso5725(laboratories: readonly (readonly string[])[]): Precision {
  const table = oneWay(laboratories);
  const n = table.n;
  const sumOfSquares = laboratories.reduce((sum, laboratory) => sum + laboratory.length ** 2, 0);
  const effective = (n - sumOfSquares / n) / table.dfBetween;
  const between = Math.max(0, (table.msBetween - table.msWithin) / effective);
  const repeatabilitySd = Math.sqrt(table.msWithin);
  const reproducibilitySd = Math.sqrt(table.msWithin + between);
  return {
    mean: table.mean,
    laboratories: laboratories.length,
    repeatabilitySd,
    betweenLaboratorySd: Math.sqrt(between),
    reproducibilitySd,
    repeatabilityLimit: 2.8 * repeatabilitySd,
    reproducibilityLimit: 2.8 * reproducibilitySd,
  };
}
