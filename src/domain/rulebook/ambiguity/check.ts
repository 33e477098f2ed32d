import type { Fault } from '../../failure';
import type { Dimension, Written } from '../../quantity/dimension';
import { dimensionWords } from '../../quantity/dimension';
import { dimensionsOf, findUnit } from '../../quantity/find-unit';
import { parseWritten } from '../../quantity/parse';
import { compare, type Rational, zero } from '../../quantity/rational';

/** One fault at a place below the pointer given. */
export const at = (pointer: string, detail: string): Fault => ({ pointer, detail });

export const when = (wrong: boolean, pointer: string, detail: string): readonly Fault[] =>
  wrong ? [at(pointer, detail)] : [];

export const isBlank = (text: string | undefined): boolean =>
  text === undefined || text.trim() === '';

/** The faults of a unit's name for a quantity of this dimension. */
export const unitFaults = (
  unit: string,
  dimension: Dimension,
  pointer: string,
  label: string,
): readonly Fault[] => {
  if (findUnit(dimension, unit) !== undefined) return [];
  const [other] = dimensionsOf(unit);
  const says =
    other === undefined
      ? `"${unit}" is no unit known here`
      : `"${unit}" measures ${dimensionWords(other)}`;
  return [at(pointer, `${says}; ${label} is ${dimensionWords(dimension)}.`)];
};

export interface Read {
  readonly value: Rational | undefined;
  readonly faults: readonly Fault[];
}

/** Reads one written number of the rule; absent is no fault here. */
export const read = (
  written: Written | undefined,
  dimension: Dimension,
  pointer: string,
  label: string,
): Read => {
  if (written === undefined) return { value: undefined, faults: [] };
  const units = unitFaults(written.unit, dimension, `${pointer}/unit`, label);
  if (units.length > 0) return { value: undefined, faults: units };
  const parsed = parseWritten(written, dimension);
  return parsed.ok
    ? { value: parsed.value.value, faults: [] }
    : { value: undefined, faults: [at(`${pointer}/text`, parsed.failure.detail)] };
};

export const isNegative = (value: Rational | undefined): boolean =>
  value !== undefined && compare(value, zero) < 0;

export const isZero = (value: Rational | undefined): boolean =>
  value !== undefined && compare(value, zero) === 0;
