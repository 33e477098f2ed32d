import type { Dimension } from './dimension';
import { getUnit } from './find-unit';
import { type Quantity, quantityOf } from './quantity';
import { toNumber } from './rational';

/** The same quantity in another unit of its dimension; the value in the base does not change. */
export const convert = <D extends Dimension>(quantity: Quantity<D>, unit: string): Quantity<D> =>
  quantityOf(quantity.dimension, quantity.value, unit);

/** The value in the base (m, kg, K …) as a double: for statistics, never for a comparison with a limit. */
export const baseNumber = (quantity: Quantity): number => toNumber(quantity.value);

/** A width (an uncertainty, a difference) in the base as a double in the unit: no offset is applied. */
export const widthIn = (dimension: Dimension, base: number, unit: string): number =>
  base / toNumber(getUnit(dimension, unit).factor);

/** The reverse of `widthIn`. */
export const widthFrom = (dimension: Dimension, width: number, unit: string): number =>
  width * toNumber(getUnit(dimension, unit).factor);
