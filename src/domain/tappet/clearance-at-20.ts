import { at20, readBy } from '../measurement/temperature';
import { add, type Rational, sub } from '../quantity/rational';
import type { BoreSheet } from './bore-sheet';
import { warmthsOf } from './budget/warmths';
import { type Clearance, clearanceOf, type Diameters } from './clearance';

/**
 * The clearance when all is at 20 °C (ISO 1): each diameter as it truly is now (the gauge's or the
 * ring's own growth put back) over its own growth. Exact. `null` without temperatures or sizes.
 */
export const clearanceAt20 = (sheet: BoreSheet, now: Diameters): Clearance | null => {
  const warmths = warmthsOf(sheet);
  if (warmths === null || !now.sizesKnown) return null;
  const { bore, lifter, setting, gauge } = warmths;
  const byGauge = (read: Rational): Rational => (gauge === undefined ? read : readBy(read, gauge));
  const ring = sheet.method === 'comparative' ? sheet.zeroSize?.value : undefined;
  const trueBore = (read: Rational): Rational => {
    if (ring === undefined) return byGauge(read);
    const ringNow = setting === undefined ? ring : readBy(ring, setting);
    return add(ringNow, sub(read, ring));
  };
  return clearanceOf(
    now.bores.map((read) => at20(trueBore(read), bore)),
    now.lifters.map((read) => at20(byGauge(read), lifter)),
  );
};
