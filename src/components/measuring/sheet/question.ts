import { parseWritten } from '@/domain/quantity/parse';
import { compareQuantities, type Quantity } from '@/domain/quantity/quantity';
import { fromStored } from '@/domain/quantity/stored';
import { getQuantityEntry, type QuantityName } from '@/domain/rulebook/quantity-catalogue';

const inches = (text: string): Quantity<'length'> => fromStored({ text, unit: 'in' }, 'length');

/** Outside of these no tappet, bore or dial reads; a slip of the key rather. Common practice. */
const PLAUSIBLE: Partial<Record<QuantityName, readonly [string, string]>> = {
  'lifter-body-diameter': ['0.7', '1.1'],
  'foot-diameter': ['0.6', '1.3'],
  'tappet-bore-diameter': ['0.7', '1.2'],
  'valve-lift': ['0.05', '1'],
  'cylinder-bore': ['1.5', '6'],
  stroke: ['1', '6'],
};
const DIAL = ['-0.006', '0.006'] as const;

/** Asks about a number that can hardly be meant; nothing about any other. It is never dropped. */
export const questionOf = (read: {
  readonly value: string;
  readonly unit: string;
  readonly comparative: boolean;
  readonly quantity: QuantityName;
}): string | undefined => {
  const range = read.comparative ? DIAL : PLAUSIBLE[read.quantity];
  if (range === undefined || getQuantityEntry(read.quantity).dimension !== 'length')
    return undefined;
  const length = parseWritten({ text: read.value, unit: read.unit }, 'length');
  if (!length.ok) return length.failure.detail;
  const low = compareQuantities(length.value, inches(range[0])) < 0;
  const high = compareQuantities(length.value, inches(range[1])) > 0;
  if (!low && !high) return undefined;
  const unit = read.unit === 'thou' ? 'thousandths' : read.unit;
  return `${read.value.replace('-', '−')} ${unit} is ${low ? 'less' : 'more'} than can be expected here. Enter again if it was read so.`;
};
