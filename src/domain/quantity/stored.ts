import type { Dimension, Written } from './dimension';
import { parseWritten } from './parse';
import type { Quantity } from './quantity';
import { mul, type Rational, rational } from './rational';
import { halfEven } from './round';

/** What a database keeps: the value as written, and a whole number to sort and to search by. */
export interface Stored extends Written {
  readonly exact: bigint;
}

/**
 * Whole steps to one base unit. Length: picometres (1 µin = 25,400 pm), so that it fits 64 bits. The
 * other dimensions: fine enough that every unit's 1e-6 step is a whole number of them (area: 1e-6 mm²
 * and 1e-6 in²; volume: 1e-6 in³; mass: 1e-6 oz; force: 1e-6 lbf; angle: 1e-6 minute; pressure: 1e-6
 * psi; temperature: 1e-6 °F; stiffness: 1e-6 lbf/in). Force, pressure and stiffness can pass 64 bits:
 * keep them in a `numeric` column.
 */
const STEPS: Readonly<Record<Dimension, bigint>> = {
  length: 10n ** 12n,
  area: 10n ** 14n,
  volume: 10n ** 18n,
  mass: 16n * 10n ** 14n,
  force: 10n ** 19n,
  angle: 60n * 10n ** 6n,
  pressure: 129_032n * 10n ** 10n,
  temperature: 9n * 10n ** 6n,
  'temperature-difference': 9n * 10n ** 6n,
  stiffness: 127n * 10n ** 17n,
  ratio: 10n ** 9n,
  count: 10n ** 6n,
};

/** The exact grid of a dimension in its base: what an uncertainty is rounded to before a comparison. */
export const gridOf = (dimension: Dimension): Rational => rational(1n, STEPS[dimension]);

/** Finer than the step is rounded half to even here and only here: text and unit stay the value. */
export const toStored = (quantity: Quantity): Stored => ({
  text: quantity.text,
  unit: quantity.unit,
  exact: halfEven(mul(quantity.value, rational(STEPS[quantity.dimension]))),
});

/** Back from the text and the unit; throws a RangeError when they were never a quantity of this dimension. */
export const fromStored = <D extends Dimension>(stored: Written, dimension: D): Quantity<D> => {
  const read = parseWritten(stored, dimension);
  if (!read.ok) throw new RangeError(read.failure.detail);
  return read.value;
};
