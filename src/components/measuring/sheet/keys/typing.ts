import type { PadKey } from '@/components/tappet/keys';
import { scaledText } from '@/domain/quantity/decimal-text';
import { fromDecimalText } from '@/domain/quantity/rational';

/** What has been typed and not entered yet. */
export interface Typed {
  readonly digits: string;
  readonly negative: boolean;
}

export const NOTHING: Typed = { digits: '', negative: false };

const MOST = 9;

/** The typed number after one more key; Enter is not for here. */
export const press = (typed: Typed, key: Exclude<PadKey, 'enter'>): Typed => {
  const { digits, negative } = typed;
  if (key === 'sign') return { digits, negative: !negative };
  if (key === 'erase') return digits === '' ? NOTHING : { digits: digits.slice(0, -1), negative };
  if (key === 'point') return digits.includes('.') ? typed : { digits: `${digits}.`, negative };
  return digits.length >= MOST ? typed : { digits: digits + key, negative };
};

/** Digits that are completed from a size; three would hide a digit that was dropped. */
const COMPLETED = 2;

/**
 * The number that was meant: decimals are implied by what the gauge resolves, `17` of tenths is 1.7;
 * a typed point says otherwise, and keeps at least those decimals. Of a size that is known, one or two
 * digits are its last: `23` of 0.8420 is 0.8423. Nothing while no digit is typed.
 */
export const typedNumber = (
  { digits, negative }: Typed,
  decimals: number,
  base?: string,
): string | undefined => {
  if (!/\d/.test(digits)) return undefined;
  if (base !== undefined && !negative && /^\d+$/.test(digits) && digits.length <= COMPLETED)
    return base.slice(0, base.length - digits.length) + digits;
  const [whole = '', part] = digits.split('.');
  const text =
    part === undefined
      ? scaledText(BigInt(whole), decimals)
      : `${whole === '' ? '0' : BigInt(whole)}${Math.max(part.length, decimals) === 0 ? '' : `.${part.padEnd(decimals, '0')}`}`;
  return negative && fromDecimalText(text).n !== 0n ? `-${text}` : text;
};

const DIGITS = ['zero', 'one', 'two', 'three', 'four', 'five', 'six', 'seven', 'eight', 'nine'];

/** The number as it is read back across the bay: "plus, zero point two". */
export const aloud = (text: string, signed: boolean): string => {
  const words = [...text.replace(/^[-+−]/, '')].map((c) =>
    c === '.' ? 'point' : (DIGITS[Number(c)] ?? ''),
  );
  const sign = /^[-−]/.test(text)
    ? 'minus, '
    : signed && fromDecimalText(text.replace('−', '-')).n !== 0n
      ? 'plus, '
      : '';
  return `${sign}${words.join(' ')}`;
};
