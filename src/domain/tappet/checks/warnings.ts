import type { TemperatureAdvice } from '../../measurement/hold';
import type { Repeatability } from '../../measurement/repeatability';
import { abs, compare, fromDecimalText, type Rational, sub } from '../../quantity/rational';
import type { BoreSheet } from '../bore-sheet';
import type { Clearance } from '../clearance';

const NOMINAL = ['0.842', '0.875', '0.904'].map((inches) => fromDecimalText(inches));
const INCH = fromDecimalText('0.0254');
/** Differences of temperature, in kelvin, from which parts are better left to settle. Common practice. */
const SETTLE = fromDecimalText('5');
/** No clearance of a tappet is this large, in metres (0.020 in): a slip of the pen or of the zero. */
const SLIP = fromDecimalText('0.000508');

interface Found {
  readonly clearance: Clearance | null;
  readonly advice: TemperatureAdvice | null | undefined;
  readonly repeatability: Repeatability | null;
  readonly redo: boolean;
}

/** Typical errors and weak points of the sheet, each in a plain sentence with what to do. */
export const warningsOf = (
  sheet: BoreSheet,
  { clearance, advice, repeatability, redo }: Found,
): readonly string[] => {
  const comparative = sheet.method === 'comparative';
  const onLifter = comparative && sheet.zeroSize === undefined;
  const { temperatures, lifter, zeros } = sheet;
  const said: readonly (string | false)[] = [
    redo &&
      'The closing zero failed: set the zero again and take these bores again. The readings are kept.',
    clearance !== null &&
      clearance.min.n < 0n &&
      'The smallest clearance is below zero: check which way the dial reads, and that bore and lifter belong together.',
    clearance !== null &&
      compare(abs(clearance.max), SLIP) > 0 &&
      'The clearance is larger than any tappet’s: check the zero, the unit and a lost sign.',
    repeatability === null &&
      'No place was read twice: repeatability is taken from common practice, not from this sheet.',
    onLifter &&
      lifter.length === 0 &&
      'The lifter’s diameters were not given: mean and largest clearance take it at its widest all over.',
    lifter.length > 0 &&
      lifter.every((one) => NOMINAL.some((nominal) => isInches(one.value, nominal))) &&
      'Every lifter reading is exactly a nominal size: measure this lifter, nominal sizes vary.',
    comparative &&
      zeros?.opening === undefined &&
      zeros?.closing === undefined &&
      'No opening and closing zero were given: how far the zero moved is not known.',
    comparative &&
      sheet.gauge?.division === undefined &&
      'The dial’s division was not given: 0.0001 in is taken.',
    ...(temperatures === undefined ? [] : temperatureWarnings(sheet, advice)),
  ];
  return said.filter((one) => one !== false);
};

const isInches = (value: Rational, inches: Rational): boolean =>
  value.n * INCH.d * inches.d === inches.n * INCH.n * value.d;

const temperatureWarnings = (
  sheet: BoreSheet,
  advice: Found['advice'],
): readonly (string | false)[] => {
  const { temperatures, lifter, method, zeroSize } = sheet;
  if (temperatures === undefined) return [];
  const apart = compare(abs(sub(temperatures.bore.value, temperatures.lifter.value)), SETTLE) > 0;
  return [
    advice === 'refuse' &&
      'The temperatures are too uncertain for this limit: nothing is stated from these readings. Hold the parts and measure again.',
    (advice === 'hold' || (advice !== 'refuse' && apart)) &&
      'The parts are not settled: hold them until block, lifter and gauge are within 5 °C, and measure again.',
    sheet.materials === undefined &&
      'Materials were not given: an iron block and a steel lifter are taken.',
    method === 'comparative' &&
      zeroSize === undefined &&
      lifter.length === 0 &&
      'Without the lifter’s diameter the clearance cannot be taken to 20 °C.',
  ];
};
