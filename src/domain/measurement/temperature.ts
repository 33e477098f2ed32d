import type { Quantity } from '../quantity/quantity';
import {
  add,
  div,
  fromDecimalText,
  mul,
  one,
  type Rational,
  sub,
  toNumber,
} from '../quantity/rational';
import type { Material } from './material';
import { rectangular, type UncertaintyComponent } from './uncertainty';

/** 20 °C, the standard reference temperature (ISO 1), in kelvin. */
export const REFERENCE = fromDecimalText('293.15');

/**
 * How well one spot's thermometer tells the temperature of the whole part: half-width in kelvin of 1, and
 * a tenth of the part's distance from 20 °C, since what is far from its surroundings is not even. Common
 * practice.
 */
const THERMOMETER = 1;
const UNEVEN = 0.1;

/** How warm something is and what it is made of. */
export interface Warmth {
  readonly temperature: Quantity<'temperature'>;
  readonly material: Material;
}

const above20 = ({ temperature }: Warmth): Rational => sub(temperature.value, REFERENCE);

/** 1 + α(T − 20 °C): what a length at 20 °C is multiplied by. Exact. */
export const growth = (warmth: Warmth): Rational =>
  add(one, mul(warmth.material.coefficient, above20(warmth)));

/** The length at 20 °C of something that has this length now: L ÷ (1 + α(T − 20 °C)). Exact. */
export const at20 = (length: Rational, warmth: Warmth): Rational => div(length, growth(warmth));

/** The true length now of something read off a gauge that is this warm and right at 20 °C. Exact. */
export const readBy = (reading: Rational, gauge: Warmth): Rational => mul(reading, growth(gauge));

/** Change of a length over a difference of temperatures: L·α·ΔT, in the unit of L. */
export const thermalChange = (length: number, coefficient: number, difference: number): number =>
  length * coefficient * difference;

/** Change of a volume: V((1 + αΔT)³ − 1). */
export const thermalChangeOfVolume = (
  volume: number,
  coefficient: number,
  difference: number,
): number => volume * ((1 + coefficient * difference) ** 3 - 1);

/**
 * Two lines of the budget for one part: that its coefficient is not known exactly, and that its
 * temperature is not. `length` in metres, signed by the side the part is on.
 */
export const temperatureComponents = (
  length: number,
  warmth: Warmth,
  words: string,
  halfWidth = THERMOMETER + UNEVEN * Math.abs(toNumber(above20(warmth))),
): readonly UncertaintyComponent[] => [
  {
    name: `expansion: ${words}`,
    standardUncertainty: rectangular(toNumber(warmth.material.halfWidth)),
    sensitivity: -length * toNumber(above20(warmth)),
    degreesOfFreedom: null,
    words: `${words}’s expansion`,
  },
  {
    name: `temperature: ${words}`,
    standardUncertainty: rectangular(halfWidth),
    sensitivity: -length * toNumber(warmth.material.coefficient),
    degreesOfFreedom: null,
    words: `${words}’s temperature`,
  },
];
