import type { Dimension } from '../../quantity/dimension';

/** What a check is made once for. `lifter` and `bore` run over the same positions. */
export type Per = 'bore' | 'lifter' | 'cylinder' | 'engine' | 'car';

/** Which sheet the numbers for a quantity come from. */
export type Source = 'lifter-sheet' | 'engine-sheet' | 'cam-sheet' | 'weight-sheet';

/** Temperatures are logged beside readings, never ruled on: differences and means need no offset. */
export type RuleDimension = Exclude<Dimension, 'temperature'>;

export interface QuantityEntry {
  readonly label: string;
  readonly dimension: RuleDimension;
  readonly unit: string;
  readonly per: Per;
  readonly source: Source;
  /** The readings or quantities it is worked out from, in words. */
  readonly from: string;
  /** A limit on it means nothing until it says where it is measured. */
  readonly needsDatum?: boolean;
  /** It must say the lash and whether a solid checking lifter stands in. */
  readonly needsLash?: boolean;
  /** Several readings at one position: a limit must say which figure counts. */
  readonly needsFigure?: boolean;
}
