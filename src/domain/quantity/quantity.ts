import { decimalText } from './decimal-text';
import type { Dimension, Written } from './dimension';
import { getUnit } from './find-unit';
import * as exact from './rational';

/**
 * A value with its unit: as written, and exactly in the base of its dimension (see `unit.ts`).
 * `D` keeps dimensions apart at compile time; the functions below refuse a mix at run time too.
 */
export interface Quantity<D extends Dimension = Dimension> extends Written {
  readonly dimension: D;
  readonly value: exact.Rational;
}

/** From an exact value in the base. Its text is the exact decimal, or ten places where there is none. */
export const quantityOf = <D extends Dimension>(
  dimension: D,
  value: exact.Rational,
  unitName: string,
): Quantity<D> => {
  const unit = getUnit(dimension, unitName);
  const shifted = unit.offset === undefined ? value : exact.sub(value, unit.offset);
  const { factor } = unit;
  const text = decimalText({ n: shifted.n * factor.d, d: shifted.d * factor.n }, 10);
  return { dimension, text, unit: unit.symbol, value };
};

const refuseMix = (a: Quantity, b: Quantity): void => {
  if (a.dimension !== b.dimension)
    throw new TypeError(`${a.dimension} and ${b.dimension} do not mix.`);
};

/** In the unit of the first. Temperatures are not added: add a temperature difference instead. */
export const plus = <D extends Exclude<Dimension, 'temperature'>>(
  a: Quantity<D>,
  b: Quantity<NoInfer<D>>,
): Quantity<D> => {
  refuseMix(a, b);
  return quantityOf(a.dimension, exact.add(a.value, b.value), a.unit);
};

/** In the unit of the first. */
export const minus = <D extends Exclude<Dimension, 'temperature'>>(
  a: Quantity<D>,
  b: Quantity<NoInfer<D>>,
): Quantity<D> => {
  refuseMix(a, b);
  return quantityOf(a.dimension, exact.sub(a.value, b.value), a.unit);
};

export const compareQuantities = <D extends Dimension>(
  a: Quantity<D>,
  b: Quantity<NoInfer<D>>,
): -1 | 0 | 1 => {
  refuseMix(a, b);
  return exact.compare(a.value, b.value);
};

/** Narrows a quantity whose dimension is known only at run time; `undefined` when it is another one. */
export const findAs = <D extends Dimension>(
  dimension: D,
  quantity: Quantity,
): Quantity<D> | undefined =>
  quantity.dimension === dimension ? (quantity as Quantity<D>) : undefined;
