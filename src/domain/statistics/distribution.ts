import { betaFraction } from './incomplete-beta';

const SQRT_PI = Math.sqrt(Math.PI);
const SQRT_2PI = Math.sqrt(2 * Math.PI);

/** Above this many degrees of freedom Student's distribution is expanded around the normal one. */
const NEARLY_NORMAL = 1e5;

export const normalDensity = (x: number): number => Math.exp((-x * x) / 2) / SQRT_2PI;

/** P(Z ≤ x) of the standard normal distribution; relative accuracy about 1e-14, in the tails too. */
export function normalCdf(x: number): number {
  return x <= 0 ? normalTail(-x) : 1 - normalTail(x);
}

/** P(Z > x) for x ≥ 0: power series near the middle, Laplace's continued fraction in the tail. */
function normalTail(x: number): number {
  if (x < 3) {
    let term = x;
    let sum = x;
    for (let n = 1; sum + term !== sum; n += 1) {
      term *= (x * x) / (2 * n + 1);
      sum += term;
    }
    return 0.5 - normalDensity(x) * sum;
  }
  let fraction = x;
  for (let n = 120; n >= 1; n -= 1) fraction = x + n / fraction;
  return normalDensity(x) / fraction;
}

/**
 * The x with P(Z ≤ x) = p. Starts from Abramowitz & Stegun 26.2.23 (4.5e-4) and
 * refines by Halley's method on the accurate tail. 0 and 1 give ∓Infinity, anything outside NaN.
 */
export function normalQuantile(p: number): number {
  if (!(p >= 0 && p <= 1)) return Number.NaN;
  if (p > 0.5) return -normalQuantile(1 - p);
  if (p === 0) return Number.NEGATIVE_INFINITY;
  const s = Math.sqrt(-2 * Math.log(p));
  let x =
    s -
    (2.515517 + s * (0.802853 + s * 0.010328)) /
      (1 + s * (1.432788 + s * (0.189269 + s * 0.001308)));
  for (let i = 0; i < 3; i += 1) {
    const step = (normalTail(Math.max(x, 0)) - p) / normalDensity(x);
    x += step / (1 + (x * step) / 2);
  }
  return p === 0.5 ? 0 : -x;
}

/** P(T ≤ t) of Student's distribution; `dof` > 0, fractional or Infinity. Absolute accuracy about 1e-13. */
export function studentCdf(t: number, dof: number): number {
  if (!(dof > 0)) return Number.NaN;
  return t <= 0 ? studentTail(-t, dof) : 1 - studentTail(t, dof);
}

/**
 * The t with P(T ≤ t) = p; `dof` > 0, fractional or Infinity. The tail is convex and the normal
 * quantile lies below the root, so Newton's steps climb to it without overshooting.
 */
export function studentQuantile(p: number, dof: number): number {
  if (!(dof > 0) || !(p >= 0 && p <= 1)) return Number.NaN;
  if (p > 0.5) return -studentQuantile(1 - p, dof);
  if (p === 0.5) return 0;
  let t = -normalQuantile(p);
  if (dof === Number.POSITIVE_INFINITY || p === 0) return -t;
  for (let i = 0; i < 400; i += 1) {
    const step = (studentTail(t, dof) - p) / studentDensity(t, dof);
    t += step;
    if (!(Math.abs(step) > 1e-15 * t)) break;
  }
  return -t;
}

function studentDensity(t: number, dof: number): number {
  const log = -((dof + 1) / 2) * Math.log1p((t * t) / dof);
  return (gammaRatio(dof / 2) / Math.sqrt(dof * Math.PI)) * Math.exp(log);
}

/** P(T > t) for t ≥ 0: half the regularised incomplete beta function I_x(ν/2, ½), x = ν/(ν+t²). */
function studentTail(t: number, dof: number): number {
  if (dof >= NEARLY_NORMAL) return nearlyNormalTail(t, dof);
  const a = dof / 2;
  const x = dof / (dof + t * t);
  const y = (t * t) / (dof + t * t);
  const front = (Math.exp(-a * Math.log1p((t * t) / dof)) * Math.sqrt(y) * gammaRatio(a)) / SQRT_PI;
  return x < (a + 1) / (a + 2.5)
    ? (front * betaFraction(x, a, 0.5)) / a / 2
    : 0.5 - front * betaFraction(y, 0.5, a);
}

/** Fisher's expansion of the tail around the normal one, first two terms in 1/ν. */
function nearlyNormalTail(t: number, dof: number): number {
  if (dof === Number.POSITIVE_INFINITY) return normalTail(t);
  const square = t * t;
  const first = (t * (square + 1)) / (4 * dof);
  const second = (t * (((3 * square - 7) * square - 5) * square - 3)) / (96 * dof * dof);
  return normalTail(t) + normalDensity(t) * (first + second);
}

/** Γ(a + ½) / Γ(a), by its asymptotic series above 50 and the recurrence below. */
function gammaRatio(a: number): number {
  let shift = 1;
  let b = a;
  for (; b < 50; b += 1) shift *= b / (b + 0.5);
  const r = 1 / b;
  const series =
    1 + r * (-1 / 8 + r * (1 / 128 + r * (5 / 1024 + r * (-21 / 32768 - r * (399 / 262144)))));
  return shift * Math.sqrt(b) * series;
}
