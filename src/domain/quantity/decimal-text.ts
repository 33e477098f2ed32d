import type { Rational } from './rational';
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

/** The exact decimal in ASCII, or, where there is none, `decimals` places rounded half to even. */
export const decimalText = (value: Rational, decimals: number): string => {
  const places = exactDecimals(value) ?? decimals;
  return scaledText(halfEven({ n: value.n * 10n ** BigInt(places), d: value.d }), places);
};
