import { decimalText } from '../quantity/decimal-text';
import type { Dimension } from '../quantity/dimension';
import { getUnit } from '../quantity/find-unit';
import { formatIn } from '../quantity/format';
import type { Quantity } from '../quantity/quantity';
import {
  add,
  div,
  fromDecimalText,
  type Rational,
  rational,
  sub,
  toNumber,
} from '../quantity/rational';
import { halfEven, roundToDecimals } from '../quantity/round';

/** A measured value that a quantity is derived from; its standard uncertainty in the base, where known. */
export interface Input<D extends Dimension = Dimension> {
  readonly value: Quantity<D>;
  readonly standardUncertainty?: number | undefined;
}

/** One input's share: the change of the result for one standard uncertainty of the input, in the base. */
export interface Contribution {
  readonly name: string;
  readonly uncertainty: number;
}

export interface Derived<D extends Dimension = Dimension> {
  readonly value: Quantity<D>;
  /** Combined, in the base; absent when no input states one. */
  readonly standardUncertainty?: number;
  readonly contributions: readonly Contribution[];
  /** Where and how the value is taken: without it a limit on the value means nothing. */
  readonly datum: string;
  /** The way to the value, a line a step, for people. */
  readonly working: readonly string[];
}

type Values<I> = { readonly [Name in keyof I]: Rational };

interface Formula<D extends Dimension, I extends Readonly<Record<string, Input>>> {
  readonly dimension: D;
  readonly unit: string;
  readonly inputs: I;
  /** In the bases of the dimensions. */
  readonly evaluate: (values: Values<I>) => Rational;
  readonly datum: string;
  readonly working: readonly string[];
}

/** More decimals than any gauge resolves: what has no finite decimal is written with so many. */
const PLACES = 10;

/** A quantity whose value is kept exactly and whose text is at most ten places long. */
export function writtenOut<D extends Dimension>(
  dimension: D,
  value: Rational,
  unitName: string,
): Quantity<D> {
  const unit = getUnit(dimension, unitName);
  const rounded = roundToDecimals(div(value, unit.factor), PLACES, halfEven);
  return { dimension, unit: unit.symbol, value, text: decimalText(rounded, PLACES) };
}

/**
 * Evaluates a formula exactly, and its uncertainty by moving each input up and down by its own
 * (JCGM 100:2008, 5.1.3 note 2); inputs are taken as independent.
 */
export function derive<D extends Dimension, I extends Readonly<Record<string, Input>>>({
  dimension,
  unit,
  inputs,
  evaluate,
  datum,
  working,
}: Formula<D, I>): Derived<D> {
  const entries = Object.entries<Input>(inputs);
  const at = Object.fromEntries(entries.map(([name, { value }]) => [name, value.value]));
  const evaluateAt = (values: Readonly<Record<string, Rational>>) => evaluate(values as Values<I>);
  const value = writtenOut(dimension, evaluateAt(at), unit);
  const contributions: Contribution[] = [];
  for (const [name, input] of entries) {
    if (input.standardUncertainty === undefined) continue;
    const step = fromDecimalText(input.standardUncertainty.toExponential(15));
    const moved = (sign: typeof add) =>
      evaluateAt({ ...at, [name]: sign(input.value.value, step) });
    const half = div(sub(moved(add), moved(sub)), rational(2n));
    contributions.push({ name, uncertainty: Math.abs(toNumber(half)) });
  }
  if (contributions.length === 0) return { value, contributions, datum, working };
  const standardUncertainty = Math.hypot(...contributions.map(({ uncertainty }) => uncertainty));
  return { value, standardUncertainty, contributions, datum, working };
}

/** `4.030 in`, as it was typed. */
export const asTyped = ({ value }: Input): string =>
  `${value.text.replace('-', '−')} ${value.unit}`;

/** The value in its own unit with so many decimals, for a line of working. */
export const shown = (quantity: Quantity, decimals: number): string =>
  `${formatIn(quantity, quantity.unit, decimals)} ${quantity.unit}`;
