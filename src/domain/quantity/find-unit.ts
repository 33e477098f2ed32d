import type { Dimension } from './dimension';
import { UNITS, type Unit } from './unit';

const key = (name: string): string =>
  name.trim().toLowerCase().replaceAll('.', '').replace(/\s+/g, ' ');

const byName = new Map<Dimension, Map<string, Unit>>();
for (const unit of UNITS) {
  const names = byName.get(unit.dimension) ?? new Map<string, Unit>();
  byName.set(unit.dimension, names);
  for (const name of [unit.symbol, ...unit.names]) names.set(key(name), unit);
}

/** The unit a person calls by this name when they speak of this dimension, capitals, spaces and full stops aside. */
export const findUnit = <D extends Dimension>(dimension: D, name: string): Unit<D> | undefined =>
  (byName.get(dimension)?.get(name) ?? byName.get(dimension)?.get(key(name))) as
    | Unit<D>
    | undefined;

/** As `findUnit`; an unknown name is a defect and throws a RangeError. */
export const getUnit = <D extends Dimension>(dimension: D, name: string): Unit<D> => {
  const found = findUnit(dimension, name);
  if (found === undefined) throw new RangeError(`"${name}" is no unit of ${dimension}.`);
  return found;
};

/** The symbols of a dimension, the commonest first. */
export const unitSymbols = (dimension: Dimension): readonly string[] =>
  UNITS.filter((unit) => unit.dimension === dimension).map((unit) => unit.symbol);

/** The dimensions in which this name is a unit: to say "lb is a weight" where a length is wanted. */
export const dimensionsOf = (name: string): readonly Dimension[] =>
  [...byName].filter(([, names]) => names.has(key(name))).map(([dimension]) => dimension);
