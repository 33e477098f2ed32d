import { findUnit } from '../quantity/find-unit';
import { fromDecimalText, mul, type Rational, rational } from '../quantity/rational';

/** π to fifty digits: beyond every digit that is ever shown or compared. */
const PI = fromDecimalText('3.14159265358979323846264338327950288419716939937511');
const QUARTER_PI = mul(PI, rational(1n, 4n));

/** π/4 × diameter². */
export const circleArea = (diameter: Rational): Rational =>
  mul(QUARTER_PI, mul(diameter, diameter));

/** π/4 × diameter² × height. */
export const cylinderVolume = (diameter: Rational, height: Rational): Rational =>
  mul(circleArea(diameter), height);

const INCH_FAMILY: readonly string[] = ['in', 'thou', 'tenths', 'µin', 'ft'];

/** Do people who write this length unit think in inches? Throws on no unit of length. */
export function inInches(lengthUnit: string): boolean {
  const unit = findUnit('length', lengthUnit);
  if (unit === undefined) throw new RangeError(`"${lengthUnit}" is no unit of length.`);
  return INCH_FAMILY.includes(unit.symbol);
}

/** The usual unit of an area whose sides are written in this length unit. */
export const areaUnit = (lengthUnit: string): string => (inInches(lengthUnit) ? 'in²' : 'mm²');

/** The usual unit of a volume whose sides are written in this length unit. */
export const volumeUnit = (lengthUnit: string): string => (inInches(lengthUnit) ? 'in³' : 'cc');
