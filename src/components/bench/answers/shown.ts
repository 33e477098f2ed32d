import { scaledText } from '@/domain/quantity/decimal-text';
import { withRealMinus } from '@/domain/quantity/format';
import { fromDecimalText, mul, powerOfTen } from '@/domain/quantity/rational';
import { halfEven, up } from '@/domain/quantity/round';

/** A decimal from the wire with so many places, for people. */
export const shownDecimal = (text: string, places: number): string =>
  withRealMinus(scaledText(halfEven(mul(fromDecimalText(text), powerOfTen(places))), places));

/** Decimals that leave an uncertainty with two figures, within reason. */
export const placesFor = (uncertainty: number): number =>
  uncertainty > 0 ? Math.min(8, Math.max(0, 1 - Math.floor(Math.log10(uncertainty)))) : 6;

/** An uncertainty with so many places, rounded up. */
export const shownWidth = (width: number, places: number): string =>
  scaledText(up(mul(fromDecimalText(width.toPrecision(15)), powerOfTen(places))), places);

/** k with two decimals: 1.96, 2.78. */
export const shownFactor = (k: number): string => k.toFixed(2);

/** A probability or a share as a percentage, never rounded to a certainty it is not. */
export function shownPercent(part: number): string {
  const percent = 100 * part;
  if (part < 1 && percent > 99.9) return 'more than 99.9 %';
  if (part > 0 && percent < 0.1) return 'less than 0.1 %';
  return `${percent.toFixed(1)} %`;
}
