import {
  type BoreLayout,
  type BorePosition,
  positionsOf,
  samePosition,
} from './layout/bore-layout';

/** A bore that could not be measured, with the reason; it counts as dealt with and stays visible. */
export interface Unreached {
  readonly position: BorePosition;
  readonly reason: string;
}

export interface Completeness {
  readonly complete: boolean;
  readonly measured: number;
  readonly expected: number;
  /** In the order of the sheet. */
  readonly missing: readonly BorePosition[];
  /** Positions with readings that the layout does not have: a wrong bore written. */
  readonly unknown: readonly BorePosition[];
}

/** Which bores of the map are measured, which are missing, and which are no bore of this engine. */
export const completenessOf = (
  layout: BoreLayout,
  measured: readonly BorePosition[],
  unreached: readonly Unreached[] = [],
): Completeness => {
  const expected = positionsOf(layout);
  const among = (positions: readonly BorePosition[], one: BorePosition): boolean =>
    positions.some((other) => samePosition(other, one));
  const excused = unreached.map(({ position }) => position);
  const missing = expected.filter((one) => !among(measured, one) && !among(excused, one));
  return {
    complete: missing.length === 0,
    measured: expected.filter((one) => among(measured, one)).length,
    expected: expected.length,
    missing,
    unknown: measured.filter((one) => !among(expected, one)),
  };
};
