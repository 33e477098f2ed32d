import { scaledText } from './decimal-text';
import type { Dimension } from './dimension';
import { getUnit } from './find-unit';
import type { Quantity } from './quantity';
import { div, fromDecimalText, mul, powerOfTen, type Rational, sub } from './rational';
import { halfEven, type Rounding, up } from './round';

/** A value in the base as a number alone in the unit, minus as ASCII. */
export const valueText = (
  dimension: Dimension,
  base: Rational,
  unitName: string,
  decimals: number,
  rounding: Rounding = halfEven,
): string => {
  const unit = getUnit(dimension, unitName);
  const value = unit.offset === undefined ? base : sub(base, unit.offset);
  return numberText(div(value, unit.factor), decimals, rounding);
};

/** The number alone with exactly `decimals` places, minus as ASCII: for files and the wire. */
export const asciiIn = (
  { dimension, value }: Quantity,
  unitName: string,
  decimals: number,
  rounding: Rounding = halfEven,
): string => valueText(dimension, value, unitName, decimals, rounding);

/** The number alone with exactly `decimals` places and a real minus (U+2212): for people. */
export const formatIn = (
  quantity: Quantity,
  unitName: string,
  decimals: number,
  rounding: Rounding = halfEven,
): string => withRealMinus(asciiIn(quantity, unitName, decimals, rounding));

/** A width in the base (an uncertainty, a guard band) in the unit, always rounded up. */
export const formatWidth = (
  dimension: Dimension,
  base: number,
  unitName: string,
  decimals: number,
): string => {
  const { factor } = getUnit(dimension, unitName);
  const steps = (base * Number(factor.d)) / Number(factor.n);
  // Fifteen digits are what a double is good for: 0.0002000000000000001 prints as 0.0002.
  return numberText(fromDecimalText(steps.toPrecision(15)), decimals, up);
};

export const withRealMinus = (text: string): string => text.replace('-', '−');

const numberText = (value: Rational, decimals: number, rounding: Rounding): string =>
  scaledText(rounding(mul(value, powerOfTen(decimals))), decimals);
