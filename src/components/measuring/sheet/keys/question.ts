import { gaugeOf } from '@/domain/inspection/capture/gauge-record';
import { reaches } from '@/domain/measurement/gauge';
import { parseWritten } from '@/domain/quantity/parse';
import { compareQuantities, type Quantity } from '@/domain/quantity/quantity';
import { fromStored } from '@/domain/quantity/stored';
import { getQuantityEntry, type QuantityName } from '@/domain/rulebook/quantity-catalogue';
import type { SheetGauge } from '../sheet';

const inches = (text: string): Quantity<'length'> => fromStored({ text, unit: 'in' }, 'length');

/** Outside of these no tappet, bore or dial reads; a slip of the key rather. Common practice. */
const PLAUSIBLE: Partial<Record<QuantityName, readonly [string, string]>> = {
  'lifter-body-diameter': ['0.7', '1.1'],
  'foot-diameter': ['0.6', '1.3'],
  'tappet-bore-diameter': ['0.7', '1.2'],
  'valve-lift': ['0.05', '1'],
  'cylinder-bore': ['1.5', '6'],
  stroke: ['1', '6'],
  'lobe-lift': ['0.03', '0.7'],
  'deck-clearance': ['-0.2', '0.2'],
  'gasket-bore': ['1.5', '6.5'],
  'gasket-thickness': ['0.005', '0.2'],
};
const DIAL = ['-0.006', '0.006'] as const;

/** Whether a gauge reaches what was read off it; one without a range reaches all. */
const outOfRange = (
  { value, unit, comparative, quantity }: Read,
  gauge: SheetGauge | undefined,
): string | undefined => {
  if (gauge?.range === undefined || comparative) return undefined;
  const { dimension } = getQuantityEntry(quantity);
  const size = parseWritten({ text: value, unit }, dimension);
  if (!size.ok || reaches(gaugeOf(gauge, dimension), size.value)) return undefined;
  const { from, to } = gauge.range;
  return `${value} ${unit} is out of the range of ${gauge.code}, ${from.text} to ${to.text} ${to.unit}. Choose another gauge under “More”, or Enter again: it is kept, marked.`;
};

interface Read {
  readonly value: string;
  readonly unit: string;
  readonly comparative: boolean;
  readonly quantity: QuantityName;
}

/** Asks about a number that can hardly be meant; nothing about any other. It is never dropped. */
export const questionOf = (read: Read, gauge?: SheetGauge): string | undefined => {
  const range = read.comparative ? DIAL : PLAUSIBLE[read.quantity];
  const reach = outOfRange(read, gauge);
  if (reach !== undefined) return reach;
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
