import { mul, type Rational, rational } from '../quantity/rational';

/**
 * The one place where a double meets exact numbers: U, a guard band or a temperature correction's
 * uncertainty (never negative, in the base) becomes the next whole multiple of the grid that is not
 * smaller. Nearer to a multiple than 1e-12 of itself is on it: a product of doubles says no more.
 */
export const onGridOutward = (width: number, grid: Rational): Rational => {
  if (!(width >= 0 && width < Number.POSITIVE_INFINITY))
    throw new RangeError(`An uncertainty is a finite number of zero or more, not ${width}.`);
  const steps = (width * Number(grid.d)) / Number(grid.n);
  const nearest = Math.round(steps);
  const whole = Math.abs(steps - nearest) <= 1e-12 * steps ? nearest : Math.ceil(steps);
  return mul(rational(BigInt(whole)), grid);
};
