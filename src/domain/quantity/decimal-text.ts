import { type Rational, tenTo } from './rational';
import { halfEven } from './round';

/** `n` tenths-to-the-`decimals` as ASCII text with exactly that many decimals: (-25n, 2) is "-0.25". */
export const scaledText = (n: bigint, decimals: number): string => {
  if (decimals <= 0) return (n * tenTo(-decimals)).toString();
  const digits = (n < 0n ? -n : n).toString().padStart(decimals + 1, '0');
  const cut = digits.length - decimals;
  return `${n < 0n ? '-' : ''}${digits.slice(0, cut)}.${digits.slice(cut)}`;
};

/** The parts 2 and 5 of a denominator: how many decimals they need, and what is left of it. */
const decimalPart = (d: bigint): { readonly places: number; readonly rest: bigint } => {
  let rest = d;
  let twos = 0;
  let fives = 0;
  for (; rest % 2n === 0n; rest /= 2n) twos += 1;
  for (; rest % 5n === 0n; rest /= 5n) fives += 1;
  return { places: Math.max(twos, fives), rest };
};

const TEN = tenTo(10);

/**
 * The exact decimal in ASCII, or, where there is none, `decimals` places rounded half to even. The
 * number need not be in lowest terms.
 */
export const decimalText = (value: Rational, decimals: number): string => {
  const scaled = value.n * TEN;
  // Measured values end within ten places, which a division shows without looking for common divisors.
  if (scaled % value.d === 0n) return trimmed(scaledText(scaled / value.d, 10));
  const { places, rest } = decimalPart(value.d);
  if (value.n % rest === 0n)
    return trimmed(scaledText((value.n * tenTo(places)) / value.d, places));
  return scaledText(halfEven({ n: value.n * tenTo(decimals), d: value.d }), decimals);
};

const trimmed = (text: string): string => {
  let end = text.length;
  while (text.charCodeAt(end - 1) === 48) end -= 1;
  return text.slice(0, text.charCodeAt(end - 1) === 46 ? end - 1 : end);
};
