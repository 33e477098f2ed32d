import { range, type Series } from '../../measurement/series';
import { compare, type Rational, sub } from '../../quantity/rational';

export type Shape = 'straight' | 'tapered' | 'bell-mouthed' | 'waisted' | 'barrelled';

/**
 * The bore's profile from its depths' means, top to bottom; differences up to one division do not count.
 * - straight: all means within a division;
 * - barrelled: somewhere between the ends larger than both by more than a division;
 * - waisted: somewhere between the ends smaller than both by more than a division;
 * - bell-mouthed: straight but for one end, which is larger;
 * - tapered: else.
 */
export const shapeOf = (means: Series, division: Rational): Shape => {
  const [top] = means;
  const bottom = means.at(-1);
  if (top === undefined || bottom === undefined) return 'straight';
  const exceeds = (a: Rational, b: Rational): boolean => compare(sub(a, b), division) > 0;
  if (compare(range(means), division) <= 0) return 'straight';
  const between = means.slice(1, -1);
  if (between.some((mean) => exceeds(mean, top) && exceeds(mean, bottom))) return 'barrelled';
  if (between.some((mean) => exceeds(top, mean) && exceeds(bottom, mean))) return 'waisted';
  if (between.length === 0) return 'tapered';
  const flaredTop = compare(range(means.slice(1)), division) <= 0 && compare(top, bottom) > 0;
  const flaredBottom =
    compare(range(means.slice(0, -1)), division) <= 0 && compare(bottom, top) > 0;
  return flaredTop || flaredBottom ? 'bell-mouthed' : 'tapered';
};
