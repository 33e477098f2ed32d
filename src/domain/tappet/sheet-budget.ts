import type { Gauge } from '../measurement/gauge';
import { calibrationOf, resolutionOf } from '../measurement/gauge-figures';
import { range } from '../measurement/series';
import { rectangular, type UncertaintyComponent } from '../measurement/uncertainty';
import { toNumber } from '../quantity/rational';
import type { BoreSheet } from './bore-sheet';
import { line } from './budget/line';
import { readingLines } from './budget/reading-lines';
import { temperatureBudget } from './budget/temperature-budget';
import type { Diameters } from './clearance';
import { driftOf } from './dial';
import type { Place } from './places';

const INCH = 0.0254;
/** Half-width of setting a gauge between anvils or in a ring. Common practice. */
const ZERO_TRANSFER = 0.00005 * INCH;

export const DIAL: Gauge<'length'> = { kind: 'dial-bore-gauge' };
export const MICROMETER: Gauge<'length'> = { kind: 'micrometer' };

/**
 * The budget of a clearance at a place of this bore, in metres. Form (out-of-round, taper) is a result
 * and no spread: the mean is defined over the places measured. What form does add is how well the
 * zero found the lifter's widest place.
 */
export const sheetBudget = (
  sheet: BoreSheet,
  places: readonly Place[],
  now: Diameters | null,
): readonly UncertaintyComponent[] => {
  const comparative = sheet.method === 'comparative';
  const onLifter = comparative && sheet.zeroSize === undefined;
  const gauge = sheet.gauge ?? DIAL;
  const micrometer = sheet.lifterGauge ?? MICROMETER;
  return [
    ...readingLines(sheet, places, gauge),
    calibrationOf(gauge, 'the gauge’s calibration'),
    ...(onLifter ? lifterForm(sheet) : sizeOfLifter(micrometer)),
    ...(comparative ? [zeroTransfer] : []),
    ...(comparative && !onLifter
      ? [calibrationOf(sheet.settingRing ?? RING, 'the setting ring’s calibration')]
      : []),
    ...drift(sheet),
    ...temperatureBudget(sheet, now),
  ];
};

const RING: Gauge<'length'> = { kind: 'setting-ring' };

const zeroTransfer = line('zero transfer', rectangular(ZERO_TRANSFER), 'setting the zero');

const sizeOfLifter = (micrometer: Gauge<'length'>) => [
  resolutionOf(micrometer, 'the micrometer’s division'),
  calibrationOf(micrometer, 'the micrometer’s calibration'),
];

const lifterForm = ({ lifter }: BoreSheet) =>
  lifter.length < 2
    ? []
    : [
        line(
          'form: lifter',
          rectangular(toNumber(range(lifter.map((one) => one.value))) / 2),
          'finding the lifter’s widest place',
        ),
      ];

const drift = ({ zeros }: BoreSheet) => {
  const moved = driftOf(zeros);
  return moved === undefined || moved.n === 0n
    ? []
    : [
        line(
          'zero drift',
          rectangular(Math.abs(toNumber(moved)) / 2),
          'the zero’s drift over the run',
        ),
      ];
};
