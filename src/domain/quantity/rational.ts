/**
 * An exact number: numerator over a positive denominator, seldom in lowest terms: compare with `equal` or
 * `compare`, never by parts. `rational` brings it there; the operations do so only where it grows long.
 */
export interface Rational {
  readonly n: bigint;
  readonly d: bigint;
}

const SAFE = BigInt(Number.MAX_SAFE_INTEGER);

/** Greatest common divisor of numbers of zero or more. */
export const commonDivisor = (a: bigint, b: bigint): bigint => {
  // Most measured values fit a double's whole numbers, where a common divisor is found much faster.
  if (a <= SAFE && b <= SAFE) {
    let x = Number(a);
    let y = Number(b);
    while (y !== 0) {
      const rest = x % y;
      x = y;
      y = rest;
    }
    return BigInt(x);
  }
  let [x, y] = [a, b];
  while (y !== 0n) [x, y] = [y, x % y];
  return x;
};

/** In lowest terms. Throws a RangeError on a denominator of zero: a defect, never an expected failure. */
export const rational = (n: bigint, d = 1n): Rational => {
  if (d === 1n) return { n, d };
  if (d === 0n) throw new RangeError('A rational number has no denominator of zero.');
  if (d < 0n) return rational(-n, -d);
  const common = commonDivisor(n < 0n ? -n : n, d);
  return common === 1n ? { n, d } : { n: n / common, d: d / common };
};

/** Looking for a common divisor costs more than it saves while the denominator fits a machine word. */
const short = (n: bigint, d: bigint): Rational => (d > 0n && d <= SAFE ? { n, d } : rational(n, d));

export const zero: Rational = { n: 0n, d: 1n };
export const one: Rational = { n: 1n, d: 1n };

export const add = (a: Rational, b: Rational): Rational => {
  if (a.d === b.d) return { n: a.n + b.n, d: a.d };
  // Denominators of decimals mostly divide each other: the larger then serves for both.
  if (a.d % b.d === 0n) return { n: a.n + b.n * (a.d / b.d), d: a.d };
  if (b.d % a.d === 0n) return { n: a.n * (b.d / a.d) + b.n, d: b.d };
  const common = commonDivisor(a.d, b.d);
  const times = b.d / common;
  return short(a.n * times + b.n * (a.d / common), a.d * times);
};
export const sub = (a: Rational, b: Rational): Rational =>
  a.d === b.d ? { n: a.n - b.n, d: a.d } : add(a, negate(b));
export const mul = (a: Rational, b: Rational): Rational => short(a.n * b.n, a.d * b.d);
/** Throws a RangeError when `b` is zero. */
export const div = (a: Rational, b: Rational): Rational => short(a.n * b.d, a.d * b.n);
export const negate = (a: Rational): Rational => ({ n: -a.n, d: a.d });
export const abs = (a: Rational): Rational => (a.n < 0n ? negate(a) : a);

/** Negative, zero or positive as `a` is less than, equal to or greater than `b`. */
export const compare = (a: Rational, b: Rational): -1 | 0 | 1 => {
  const left = a.d === b.d ? a.n : a.n * b.d;
  const right = a.d === b.d ? b.n : b.n * a.d;
  return left < right ? -1 : left > right ? 1 : 0;
};
export const equal = (a: Rational, b: Rational): boolean => a.n * b.d === b.n * a.d;
export const min = (a: Rational, b: Rational): Rational => (compare(a, b) <= 0 ? a : b);
export const max = (a: Rational, b: Rational): Rational => (compare(a, b) >= 0 ? a : b);

/** 10 to a whole power, negative powers included. */
export const powerOfTen = (exponent: number): Rational =>
  exponent >= 0 ? { n: tenTo(exponent), d: 1n } : { n: 1n, d: tenTo(-exponent) };

const TENS = Array.from({ length: 31 }, (_, exponent) => 10n ** BigInt(exponent));

/** 10 to a whole power of zero or more. */
export const tenTo = (exponent: number): bigint => TENS[exponent] ?? 10n ** BigInt(exponent);

const DECIMAL = /^([+-]?)(\d*)(?:\.(\d*))?(?:e([+-]?\d{1,3}))?$/i;

/** Reads `-0.0002` or `1.7e-3` (ASCII, point). Throws a RangeError on anything else. */
export const fromDecimalText = (text: string): Rational => {
  const [, sign, whole = '', part = '', exponent = '0'] = DECIMAL.exec(text) ?? [];
  if (sign === undefined || whole + part === '') throw new RangeError(`Not a decimal: "${text}"`);
  const digits = BigInt(whole + part) * (sign === '-' ? -1n : 1n);
  if (exponent === '0') return { n: digits, d: tenTo(part.length) };
  return mul({ n: digits, d: 1n }, powerOfTen(Number(exponent) - part.length));
};

/** The nearest double, within an ulp, whatever the size of numerator and denominator. */
export const toNumber = (a: Rational): number => {
  const top = Number(a.n);
  if (Math.abs(top) <= Number.MAX_SAFE_INTEGER && a.d <= SAFE) return top / Number(a.d);
  const shift = BigInt(Math.max(0, a.d.toString(2).length - a.n.toString(2).length + 64));
  return Number((a.n << shift) / a.d) / 2 ** Number(shift);
};
