import type { Gauge } from '../measurement/gauge';
import { calibrationOf, resolutionOf } from '../measurement/gauge-figures';
import { pooledRepeatability, type Repeatability } from '../measurement/repeatability';
import { range } from '../measurement/series';
import { temperatureComponents } from '../measurement/temperature';
import { rectangular, type UncertaintyComponent } from '../measurement/uncertainty';
import { toNumber } from '../quantity/rational';
import type { BoreSheet } from './bore-sheet';
import type { Diameters } from './clearance';
import { driftOf } from './dial';
import type { Place } from './places';
import { boreMaterial, warmthsOf } from './warmths';

const INCH = 0.0254;
/** Standard deviation of one reading by a practised hand. Common practice; used where no repeats were taken. */
const USUAL_REPEATABILITY = 0.00004 * INCH;
/** Half-width of setting a gauge between anvils or in a ring. Common practice. */
const ZERO_TRANSFER = 0.00005 * INCH;
/** Half-width in kelvin of an unlogged difference between block and lifter left to settle. Common practice. */
const UNLOGGED = 2;
/** A lifter of 0.875 in, where no size is written: it only scales the temperature lines. */
const USUAL_SIZE = 0.875 * INCH;

export const DIAL: Gauge<'length'> = { kind: 'dial-bore-gauge' };
export const MICROMETER: Gauge<'length'> = { kind: 'micrometer' };

/** From a study or the inspection when given, else pooled over this sheet's true repeats; `null` with neither. */
export const sheetRepeatability = (
  sheet: BoreSheet,
  places: readonly Place[],
): Repeatability | null =>
  sheet.repeatability ?? pooledRepeatability(places.map((place) => place.repeats));

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
    repeatability(sheet, places),
    resolutionOf(gauge, 'the dial’s division', comparative ? 2 : 1),
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

const line = (
  name: string,
  standardUncertainty: number,
  words: string,
  rest: { readonly sensitivity?: number; readonly degreesOfFreedom?: number } = {},
): UncertaintyComponent => ({
  name,
  standardUncertainty,
  sensitivity: rest.sensitivity ?? 1,
  degreesOfFreedom: rest.degreesOfFreedom ?? null,
  words,
});

const zeroTransfer = line('zero transfer', rectangular(ZERO_TRANSFER), 'setting the zero');

const repeatability = (sheet: BoreSheet, places: readonly Place[]): UncertaintyComponent => {
  const found = sheetRepeatability(sheet, places);
  const repeats = Math.min(...places.map((place) => place.repeats.length));
  const sensitivity = 1 / Math.sqrt(places.length === 0 ? 1 : repeats);
  return found === null
    ? line('repeatability: usual', USUAL_REPEATABILITY, 'the hand’s repeatability', { sensitivity })
    : line('repeatability', found.standardDeviation, 'the hand’s repeatability', {
        sensitivity,
        degreesOfFreedom: found.degreesOfFreedom,
      });
};

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

/** The temperature's lines of the budget: of the correction where temperatures were logged, else an allowance. */
export const temperatureBudget = (
  sheet: BoreSheet,
  now: Diameters | null,
): readonly UncertaintyComponent[] => {
  const [lifter] = now?.sizesKnown === true ? now.lifters : [];
  const size = lifter === undefined ? USUAL_SIZE : toNumber(lifter);
  const warmths = warmthsOf(sheet);
  if (warmths !== null)
    return [
      ...temperatureComponents(size, warmths.bore, 'the block'),
      ...temperatureComponents(-size, warmths.lifter, 'the lifter'),
      ...(warmths.setting === undefined || sheet.zeroSize === undefined
        ? []
        : temperatureComponents(-size, warmths.setting, 'the setting ring')),
    ];
  const sensitivity = size * toNumber(boreMaterial(sheet).coefficient);
  return [
    line('temperature: not logged', rectangular(UNLOGGED), 'a temperature nobody logged', {
      sensitivity,
    }),
  ];
};
