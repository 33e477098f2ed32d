import { abs, compare, mul, type Rational, rational } from '../quantity/rational';
import type { Zeros } from './bore-sheet';
import { driftOf } from './dial';
import type { BorePosition } from './layout/bore-layout';

/** Part of the window that drift may take before the run is measured again. Common practice. */
const PART_OF_WINDOW = rational(1n, 4n);

/**
 * The drift a run may show: a quarter of the permitted zone, or one division of the dial where there is
 * no zone.
 */
export const allowedDrift = (division: Rational, window: Rational | undefined): Rational =>
  window === undefined ? division : mul(window, PART_OF_WINDOW);

/** True when the closing zero failed. Nothing is erased: the readings stand, and are taken again. */
export const mustRedo = (
  zeros: Zeros | undefined,
  division: Rational,
  window: Rational | undefined,
): boolean => {
  const drift = driftOf(zeros);
  return drift !== undefined && compare(abs(drift), allowedDrift(division, window)) > 0;
};

/** Bores measured between one opening and one closing zero. */
export interface Run {
  readonly bores: readonly BorePosition[];
  readonly zeros: Zeros;
}

/** The bores of every run whose closing zero failed, in taking order. */
export const boresToRedo = (
  runs: readonly Run[],
  division: Rational,
  window: Rational | undefined,
): readonly BorePosition[] =>
  runs.filter((run) => mustRedo(run.zeros, division, window)).flatMap((run) => run.bores);
