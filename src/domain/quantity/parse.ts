import { ok, type Result } from '../result';
import { type Dimension, dimensionWords, type Written } from './dimension';
import { dimensionsOf, findUnit, getUnit, unitSymbols } from './find-unit';
import { readNumber } from './number-text';
import type { Quantity } from './quantity';
import { abs, add, compare, fromDecimalText, mul, type Rational } from './rational';
import { findDegreesAndMinutes } from './text/angle-text';
import { type ParseFault, refuse, refuseNumber, unknownUnit } from './text/parse-fault';
import type { Unit } from './unit';

interface Expected<D extends Dimension> {
  readonly dimension: D;
  /** The unit of the column or the clause, for a number that stands alone. */
  readonly defaultUnit?: string | undefined;
}

// In metres: what a 64-bit number of picometres holds.
const LARGEST_LENGTH = fromDecimalText('9000000');
const LARGEST = fromDecimalText('1e12');

/** What most cells hold: digits with at most one point, no unit. */
const BARE = /^-?(?:\d{1,9}(?:\.\d{0,12})?|\.\d{1,12})$/;
const SPLIT =
  /^([+\-−–]?\s*[\d.,'’\u00a0\u202f/⁄ ]*\d[.,]?(?:[eE][+-]?\d{1,2})?|[+\-−–]?\s*[.,]\d+)\s*(\D.*)?$/;

/**
 * Reads a value with or without its unit, as people type it: `.0017`, `1.7 thou`, `17 tenths`,
 * `0,0431`, `−0.0002`, `60 °C`, `104°30'`, `9.5:1`. What could mean two things is refused with words.
 */
export const parseQuantity = <D extends Dimension>(
  typed: string,
  { dimension, defaultUnit }: Expected<D>,
): Result<Quantity<D>, ParseFault> => {
  const text = typed.trim();
  if (defaultUnit !== undefined && BARE.test(text))
    return taken(text, text, getUnit(dimension, defaultUnit));
  if (text === '') return refuse('empty', 'Nothing is written here.');
  if (text.length > 60) return refuse('not-a-number', 'This is too long to be a measured value.');
  if (dimension === 'angle') {
    const degrees = findDegreesAndMinutes(text);
    if (degrees !== undefined) return ok({ dimension, text, unit: 'deg', value: degrees });
  }
  const [, digits, name = ''] = SPLIT.exec(text) ?? [];
  if (digits === undefined) return refuse('not-a-number', `"${text}" is not a number.`);
  if (/^[-−–+±]?\s*[\d.,]/.test(name)) return refuseNumber('two-numbers', text);
  const number = readNumber(digits);
  if (number.fault !== undefined) return refuseNumber(number.fault, digits.trim());
  const unit = unitNamed(name.trim(), dimension, defaultUnit, text);
  if (!unit.ok) return unit;
  return taken(digits.trim(), number.plain, unit.value);
};

const taken = <D extends Dimension>(
  text: string,
  plain: string,
  unit: Unit<D>,
): Result<Quantity<D>, ParseFault> => {
  const { dimension, symbol } = unit;
  const value = inBase(fromDecimalText(plain), unit);
  if (dimension === 'temperature' && value.n < 0n)
    return refuse('impossible', `${text} ${symbol} is below absolute zero.`);
  if (dimension === 'count' && value.n % value.d !== 0n)
    return refuse('impossible', `A count is a whole number, not ${text}.`);
  if (compare(abs(value), dimension === 'length' ? LARGEST_LENGTH : LARGEST) > 0)
    return refuse('impossible', `${text} ${symbol} is too large to have been measured.`);
  return ok({ dimension, text, unit: symbol, value });
};

/** Reads the wire form, whose unit stands apart. */
export const parseWritten = <D extends Dimension>(
  written: Written,
  dimension: D,
): Result<Quantity<D>, ParseFault> =>
  findUnit(dimension, written.unit) === undefined
    ? refuse('unit-unknown', unknownUnit(written.unit, dimension))
    : parseQuantity(written.text, { dimension, defaultUnit: written.unit });

const inBase = (number: Rational, unit: Unit): Rational => {
  const scaled = mul(number, unit.factor);
  return unit.offset === undefined ? scaled : add(scaled, unit.offset);
};

const unitNamed = <D extends Dimension>(
  name: string,
  dimension: D,
  defaultUnit: string | undefined,
  text: string,
): Result<Unit<D>, ParseFault> => {
  if (name !== '') {
    const unit = findUnit(dimension, name);
    if (unit !== undefined) return ok(unit);
    const [other] = dimensionsOf(name);
    return other === undefined
      ? refuse('unit-unknown', unknownUnit(name, dimension))
      : refuse(
          'wrong-dimension',
          `"${name}" measures ${dimensionWords(other)}; ${dimensionWords(dimension)} is wanted.`,
        );
  }
  if (defaultUnit !== undefined) return ok(getUnit(dimension, defaultUnit));
  if (dimension === 'count' || dimension === 'ratio') return ok(getUnit(dimension, '1'));
  return refuse(
    'unit-missing',
    `${text} of what? Write the unit: ${unitSymbols(dimension).slice(0, 4).join(', ')}.`,
  );
};
