/** ln Γ(z) for z > 0: Stirling's series (DLMF 5.11.1) above 12 and the recurrence below; about 1e-14. */
export function logGamma(z: number): number {
  let shift = 0;
  let x = z;
  for (; x < 12; x += 1) shift += Math.log(x);
  const r = 1 / (x * x);
  const series =
    (1 / 12 +
      r * (-1 / 360 + r * (1 / 1260 + r * (-1 / 1680 + r * (1 / 1188 - (r * 691) / 360360))))) /
    x;
  return (x - 0.5) * Math.log(x) - x + Math.log(2 * Math.PI) / 2 + series - shift;
}

/** The continued fraction of the incomplete beta function (DLMF 8.17.22), by Lentz's method. */
export function betaFraction(x: number, a: number, b: number): number {
  let c = 1;
  let d = 1 / (1 - ((a + b) * x) / (a + 1));
  let value = d;
  for (let m = 1; m < 5000; m += 1) {
    const even = (m * (b - m) * x) / ((a + 2 * m - 1) * (a + 2 * m));
    d = 1 / (1 + even * d);
    c = 1 + even / c;
    value *= d * c;
    const odd = (-(a + m) * (a + b + m) * x) / ((a + 2 * m) * (a + 2 * m + 1));
    d = 1 / (1 + odd * d);
    c = 1 + odd / c;
    value *= d * c;
    if (Math.abs(d * c - 1) < 1e-16) break;
  }
  return value;
}

/** The regularised incomplete beta function I_x(a, b); absolute accuracy about 1e-12. */
export function regularisedBeta(x: number, a: number, b: number): number {
  if (x <= 0) return 0;
  if (x >= 1) return 1;
  const front = Math.exp(
    logGamma(a + b) - logGamma(a) - logGamma(b) + a * Math.log(x) + b * Math.log1p(-x),
  );
  return x < (a + 1) / (a + b + 2)
    ? (front * betaFraction(x, a, b)) / a
    : 1 - (front * betaFraction(1 - x, b, a)) / b;
}

/** The x with I_x(a, b) = p, by bisection: 60 halvings, so 1e-18 of the interval. */
export function betaQuantile(p: number, a: number, b: number): number {
  let low = 0;
  let high = 1;
  for (let i = 0; i < 60; i += 1) {
    const middle = (low + high) / 2;
    if (regularisedBeta(middle, a, b) < p) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

/** P(F > f) of the F distribution with the given degrees of freedom. */
export const fTail = (f: number, between: number, within: number): number =>
  regularisedBeta(within / (within + between * f), within / 2, between / 2);

/** The f with P(F ≤ f) = p. */
export function fQuantile(p: number, between: number, within: number): number {
  const x = betaQuantile(1 - p, within / 2, between / 2);
  return (within * (1 - x)) / (between * x);
}
