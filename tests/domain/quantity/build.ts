import type { Dimension } from '@/domain/quantity/dimension';
import { parseQuantity } from '@/domain/quantity/parse';
import type { Quantity } from '@/domain/quantity/quantity';

/** A quantity as typed; a text that does not parse fails the test that wrote it. */
export const typed = <D extends Dimension>(
  dimension: D,
  text: string,
  defaultUnit?: string,
): Quantity<D> => {
  const read = parseQuantity(text, { dimension, defaultUnit });
  if (!read.ok) throw new Error(`${text}: ${read.failure.detail}`);
  return read.value;
};

export const inches = (text: string): Quantity<'length'> => typed('length', text, 'in');
export const millimetres = (text: string): Quantity<'length'> => typed('length', text, 'mm');
export const degrees = (text: string): Quantity<'temperature'> => typed('temperature', text);

/** A standard uncertainty in inches in the base. */
export const inMetres = (width: number): number => width * 0.0254;
