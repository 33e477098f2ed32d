import type { Gauge } from '../measurement/gauge';
import { calibrationOf, resolutionOf } from '../measurement/gauge-figures';
import { largest } from '../measurement/series';
import type { UncertaintyComponent } from '../measurement/uncertainty';
import { quantityOf } from '../quantity/quantity';
import { sub } from '../quantity/rational';
import type { Length } from './bore-sheet';
import { MICROMETER } from './sheet-budget';

export interface FootAgainstBody {
  /** Foot at its largest less body at its widest; positive: the foot is larger, and a faster lobe works. */
  readonly difference: Length;
  readonly components: readonly UncertaintyComponent[];
}

/**
 * Foot against body of a flat tappet, both read with one micrometer, so that its calibration error falls
 * out of the difference and only its two readings remain. `null` without a reading of each.
 */
export const footAgainstBody = (
  foot: readonly Length[],
  body: readonly Length[],
  unit: string,
  gauge: Gauge<'length'> = MICROMETER,
): FootAgainstBody | null => {
  if (foot.length === 0 || body.length === 0) return null;
  const widest = (lengths: readonly Length[]) => largest(lengths.map((length) => length.value));
  return {
    difference: quantityOf('length', sub(widest(foot), widest(body)), unit),
    components: [
      resolutionOf(gauge, 'the micrometer’s division', 2),
      // Its linearity between two near sizes: half of what its whole range may be off by.
      calibrationOf(gauge, 'the micrometer’s calibration', 0.5),
    ],
  };
};
