import { rational, toNumber } from '../quantity/rational';

/** A decimal number as typed: optional sign, digits, `.`, optional power of ten within ±99. */
export const DECIMAL = /^[+\-−]?(?:\d{1,40}\.?\d{0,40}|\.\d{1,40})(?:[eE][+-]?\d{1,2})?$/;

interface Parts {
  readonly digits: bigint;
  readonly scale: number;
}

function parts(text: string): Parts {
  if (!DECIMAL.test(text)) throw new RangeError(`not a decimal number: ${text}`);
  const [mantissa = '', exponent = '0'] = text.replace('−', '-').toLowerCase().split('e');
  const [whole = '', fraction = ''] = mantissa.split('.');
  return {
    digits: BigInt(whole.replace('+', '') + fraction),
    scale: fraction.length - Number(exponent),
  };
}

/** The smallest scale at which every text is a whole number of 10^−scale. */
export const commonScale = (texts: readonly string[]): number =>
  texts.reduce((scale, text) => Math.max(scale, parts(text).scale), 0);

/** The number in whole units of 10^−scale, exactly; `scale` must not be smaller than the text's own. */
export function unitsAt(text: string, scale: number): bigint {
  const { digits, scale: own } = parts(text);
  return digits * 10n ** BigInt(scale - own);
}

/** numerator ÷ denominator as the nearest double within an ulp; NaN over zero. */
export const quotient = (numerator: bigint, denominator: bigint): number =>
  denominator === 0n ? Number.NaN : toNumber(rational(numerator, denominator));

/** (numerator ÷ denominator) × 10^−scale as a double. */
export const scaledQuotient = (numerator: bigint, denominator: bigint, scale: number): number =>
  quotient(numerator, denominator * 10n ** BigInt(scale));
