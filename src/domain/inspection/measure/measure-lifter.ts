import type { Gauge } from '../../measurement/gauge';
import { calibrationOf, resolutionOf } from '../../measurement/gauge-figures';
import { getMaterial } from '../../measurement/material';
import type { Repeatability } from '../../measurement/repeatability';
import { rectangular, type UncertaintyComponent } from '../../measurement/uncertainty';
import { toNumber } from '../../quantity/rational';
import type { Length } from '../../tappet/bore-sheet';

const INCH = 0.0254;
/** Standard deviation of one micrometer reading by a practised hand. Common practice. */
const USUAL_REPEATABILITY = 0.00004 * INCH;
/** Half-width in kelvin of a difference between lifter and micrometer, left to settle together. Common practice. */
const SETTLED = 2;

/** The budget of a diameter read off a micrometer, in metres. */
export const diameterBudget = (
  size: Length,
  micrometer: Gauge<'length'>,
  repeatability?: Repeatability | undefined,
): readonly UncertaintyComponent[] => [
  resolutionOf(micrometer, 'the micrometer’s division'),
  calibrationOf(micrometer, 'the micrometer’s calibration'),
  {
    name: repeatability === undefined ? 'repeatability: usual' : 'repeatability',
    standardUncertainty: repeatability?.standardDeviation ?? USUAL_REPEATABILITY,
    sensitivity: 1,
    degreesOfFreedom: repeatability?.degreesOfFreedom ?? null,
    words: 'the hand’s repeatability',
  },
  {
    name: 'temperature: settled',
    standardUncertainty: rectangular(SETTLED),
    sensitivity: toNumber(size.value) * toNumber(getMaterial('steel').coefficient),
    degreesOfFreedom: null,
    words: 'how alike lifter and micrometer are in temperature',
  },
];

/**
 * Of a difference between two readings of one bore (out-of-round, taper): what the gauge is off by
 * falls out, its division and the hand's repeatability stand in both readings.
 */
export const formBudget = (
  gauge: Gauge<'length'>,
  budget: readonly UncertaintyComponent[],
): readonly UncertaintyComponent[] => [
  resolutionOf(gauge, 'the dial’s division', 2),
  ...budget
    .filter((line) => line.name.startsWith('repeatability'))
    .map((line) => ({ ...line, sensitivity: line.sensitivity * Math.SQRT2 })),
];
