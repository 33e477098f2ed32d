import { div, mul, powerOfTen, type Rational, rational } from './rational';

/** Takes an exact number to a whole one. Each rule is a function with a name that a rulebook can state. */
export type Rounding = (value: Rational) => bigint;

/** Toward minus infinity. */
export const down: Rounding = ({ n, d }) => (n >= 0n || n % d === 0n ? n / d : n / d - 1n);

/** Toward plus infinity: "rounded up". */
export const up: Rounding = ({ n, d }) => -down({ n: -n, d });

/** Away from zero: the larger magnitude. */
export const awayFromZero: Rounding = (value) => (value.n < 0n ? down(value) : up(value));

const nearest =
  (tie: (below: bigint, value: Rational) => bigint): Rounding =>
  (value) => {
    const below = down(value);
    const twice = 2n * (value.n - below * value.d);
    if (twice === value.d) return tie(below, value);
    return twice < value.d ? below : below + 1n;
  };

/** To the nearest, a tie to the even digit: ASTM E29 and NIST SP 811 appendix B.7.1. */
export const halfEven: Rounding = nearest((below) => (below % 2n === 0n ? below : below + 1n));

/** To the nearest, a tie away from zero: what most people do by hand. */
export const halfAwayFromZero: Rounding = nearest((below, value) =>
  value.n < 0n ? below : below + 1n,
);

/** To a whole multiple of a step. */
export const roundToStep = (value: Rational, step: Rational, rounding: Rounding): Rational =>
  mul(rational(rounding(div(value, step))), step);

/** To so many decimals; negative for tens and hundreds. */
export const roundToDecimals = (value: Rational, decimals: number, rounding: Rounding): Rational =>
  roundToStep(value, powerOfTen(-decimals), rounding);

/** An interval to a grid so that it never shrinks: its low end down, its high end up. */
export const outward = (
  interval: { readonly low: Rational; readonly high: Rational },
  step: Rational,
): { readonly low: Rational; readonly high: Rational } => ({
  low: roundToStep(interval.low, step, down),
  high: roundToStep(interval.high, step, up),
});
