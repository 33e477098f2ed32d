import { fromDecimalText, type Rational } from './rational';

/** Why a text is not taken for a number. */
export type NumberFault = 'not-a-number' | 'ambiguous' | 'two-numbers' | 'fraction';

/** Plain ASCII decimal text, or a fault. */
export type NumberReading =
  | { readonly plain: string; readonly fault?: undefined }
  | { readonly plain?: undefined; readonly fault: NumberFault };

// No reading of any unit needs more; beyond it a text is a slip or an attack.
const LARGEST_EXPONENT = 15;

const GROUPS = "[,.'’\\u00a0\\u202f]";
const GROUPED = new RegExp(`^([1-9]\\d{0,2})((${GROUPS})\\d{3}(?:\\3\\d{3})*)(?:([.,])(\\d*))?$`);
const PLAIN = /^(\d*)(?:([.,])(\d*))?$/;

/**
 * Reads digits with at most one sign, a decimal point or comma, marks between groups of three, and an
 * exponent as spreadsheets write it. A point on its own is always the decimal point, as gauges print
 * it. A comma on its own followed by exactly three digits (`1,234`) could be either: refused. With two
 * kinds of mark (`1,234.5`, `1.234,5`), or a mark that repeats, there is one reading only: taken.
 */
export const readNumber = (typed: string): NumberReading => {
  const text = typed.trim().replace(/^[−–]/, '-');
  if (/^[+-]?[\d.,]+\s+[\d.,]/.test(text) && !/[\u00a0\u202f]/.test(text))
    return { fault: 'two-numbers' };
  if (/\d\s*[/⁄]\s*\d/.test(text)) return { fault: 'fraction' };
  const [, sign = '', digits = '', exponent = ''] =
    /^([+-]?)(.*?)(e[+-]?\d{1,2})?$/i.exec(text) ?? [];
  if (!/\d/.test(digits) || Math.abs(Number(exponent.slice(1))) > LARGEST_EXPONENT)
    return { fault: 'not-a-number' };
  const grouped = GROUPED.exec(digits);
  if (grouped !== null) return readGrouped(sign, grouped, exponent);
  const plain = PLAIN.exec(digits);
  if (plain === null) return { fault: 'not-a-number' };
  return {
    plain: `${sign}${plain[1] ?? ''}.${plain[3] ?? ''}${exponent}`.replace(/\.(?=e|$)/i, ''),
  };
};

const readGrouped = (sign: string, match: RegExpExecArray, exponent: string): NumberReading => {
  const [, head = '', groups = '', mark = '', decimalMark, decimals = ''] = match;
  if (decimalMark !== undefined && decimalMark === mark) return { fault: 'not-a-number' };
  const single = decimalMark === undefined && groups.length === 4;
  if (single && mark === ',') return { fault: 'ambiguous' };
  if (single && mark === '.') return { plain: `${sign}${head}${groups}${exponent}` };
  const whole = head + groups.replaceAll(mark, '');
  return { plain: `${sign}${whole}${decimals === '' ? '' : `.${decimals}`}${exponent}` };
};

/** The exact value of a number as typed; `undefined` where it is none or could be two. */
export const findNumber = (typed: string): Rational | undefined => {
  const { plain } = readNumber(typed);
  return plain === undefined ? undefined : fromDecimalText(plain);
};

/** Decimals a text carries, trailing zeros included: the resolution it was read with. `0.8440` has 4. */
export const decimalsOf = (typed: string): number => {
  const bare = /^-?\d*\.(\d+)$/.exec(typed);
  if (bare !== null) return bare[1]?.length ?? 0;
  const [, decimals = '', exponent = '0'] =
    /\.?(\d*)(?:e([+-]?\d+))?$/i.exec((readNumber(typed).plain ?? '').replace(/^[^.e]*/i, '')) ??
    [];
  return Math.max(0, decimals.length - Number(exponent));
};
