import { convert } from '../quantity/convert';
import { getUnit } from '../quantity/find-unit';
import type { Quantity } from '../quantity/quantity';
import { add, mul, type Rational, rational, zero } from '../quantity/rational';
import { roundToStep, up } from '../quantity/round';
import { cylinderVolume, volumeUnit } from './circle';
import { asTyped, type Derived, derive, type Input, shown, writtenOut } from './derived';

export interface Cylinders {
  /** One bore for all cylinders, or one for each. */
  readonly bores: readonly Input<'length'>[];
  readonly stroke: Input<'length'>;
  readonly cylinders: number;
}

const DATUM =
  'bore at the cylinder, stroke from top to bottom dead centre; π/4 × bore² × stroke × cylinders';

/**
 * Swept volume of the engine, in in³ or cc as the bore is written. One bore that stands for all
 * cylinders makes one common error; bores measured one by one make independent ones.
 */
export function displacement({ bores, stroke, cylinders }: Cylinders): Derived<'volume'> {
  const [first] = bores;
  if (first === undefined || (bores.length !== 1 && bores.length !== cylinders)) {
    throw new RangeError('give one bore for all cylinders, or one for each');
  }
  if (!Number.isInteger(cylinders) || cylinders < 1) throw new RangeError('cylinders are counted');
  const share = rational(BigInt(cylinders / bores.length));
  const names = bores.map((_, i) => (bores.length === 1 ? 'bore' : `bore ${i + 1}`));
  const inputs: Record<string, Input<'length'>> = { stroke };
  for (const [i, bore] of bores.entries()) inputs[names[i] ?? ''] = bore;
  const total = (values: Readonly<Record<string, Rational>>) =>
    names.reduce(
      (sum, name) =>
        add(sum, mul(share, cylinderVolume(values[name] ?? zero, values['stroke'] ?? zero))),
      zero,
    );
  const result = derive({
    dimension: 'volume',
    unit: volumeUnit(first.value.unit),
    inputs,
    evaluate: total,
    datum: DATUM,
    working: [],
  });
  const each = bores.length === 1 ? ` × ${cylinders} cylinders` : ', summed over the cylinders';
  const bore = bores.length === 1 ? asTyped(first) : 'each bore';
  const other = convert(result.value, result.value.unit === 'in³' ? 'cc' : 'in³');
  return {
    ...result,
    working: [
      `π/4 × (${bore})² × ${asTyped(stroke)}${each}`,
      `= ${shown(result.value, 4)} (${shown(other, other.unit === 'cc' ? 1 : 2)})`,
    ],
  };
}

/** Up to the next whole unit; a whole number stays. */
export function roundedUp(volume: Quantity<'volume'>): Quantity<'volume'> {
  const { factor } = getUnit('volume', volume.unit);
  return writtenOut('volume', roundToStep(volume.value, factor, up), volume.unit);
}

/**
 * What is held against what where a rule says "rounded up". `limit`: the limit, worked out from the
 * largest bore and the stroke, is rounded up and the measured value taken as it is. `measured`: the
 * measured value is rounded up first, so a fraction above the limit is a whole unit above it.
 */
export const roundedForComparison = (
  measured: Quantity<'volume'>,
  limit: Quantity<'volume'>,
  what: 'limit' | 'measured',
): { readonly measured: Quantity<'volume'>; readonly limit: Quantity<'volume'> } =>
  what === 'limit'
    ? { measured, limit: roundedUp(limit) }
    : { measured: roundedUp(measured), limit };
