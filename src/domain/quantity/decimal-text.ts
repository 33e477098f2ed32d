import { type Rational, rational } from './rational';
import { halfEven } from './round';

/** `n` tenths-to-the-`decimals` as ASCII text with exactly that many decimals: (-25n, 2) is "-0.25". */
export const scaledText = (n: bigint, decimals: number): string => {
  if (decimals <= 0) return (n * 10n ** BigInt(-decimals)).toString();
  const digits = (n < 0n ? -n : n).toString().padStart(decimals + 1, '0');
  const cut = digits.length - decimals;
  return `${n < 0n ? '-' : ''}${digits.slice(0, cut)}.${digits.slice(cut)}`;
};

/** Decimals needed to write the number exactly; `undefined` where no finite decimal does. */
const exactDecimals = (value: Rational): number | undefined => {
  let rest = value.d;
  let decimals = 0;
  for (; rest % 10n === 0n; rest /= 10n) decimals += 1;
  const factor = rest % 2n === 0n ? 2n : 5n;
  for (; rest % factor === 0n; rest /= factor) decimals += 1;
  return rest === 1n ? decimals : undefined;
};

const TEN = 10n ** 10n;

/**
 * The exact decimal in ASCII, or, where there is none, `decimals` places rounded half to even. The
 * number need not be in lowest terms.
 */
export const decimalText = (value: Rational, decimals: number): string => {
  const scaled = value.n * TEN;
  // Measured values end within ten places, which a division shows without looking for common divisors.
  if (scaled % value.d === 0n) return trimmed(scaledText(scaled / value.d, 10));
  const lowest = rational(value.n, value.d);
  const places = exactDecimals(lowest) ?? decimals;
  return scaledText(halfEven({ n: lowest.n * 10n ** BigInt(places), d: lowest.d }), places);
};

const trimmed = (text: string): string => text.replace(/\.?0+$/, '');
