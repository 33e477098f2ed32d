import type { Gauge } from '../../measurement/gauge';
import { resolutionOf } from '../../measurement/gauge-figures';
import { pooledRepeatability, type Repeatability } from '../../measurement/repeatability';
import type { UncertaintyComponent } from '../../measurement/uncertainty';
import type { BoreSheet } from '../bore-sheet';
import type { Place } from '../places';
import { line } from './line';

/** Standard deviation of one reading by a practised hand. Common practice; used where no repeats were taken. */
const USUAL_REPEATABILITY = 0.00004 * 0.0254;

/** From a study or the inspection when given, else pooled over this sheet's true repeats; `null` with neither. */
export const sheetRepeatability = (
  sheet: BoreSheet,
  places: readonly Place[],
): Repeatability | null =>
  sheet.repeatability ?? pooledRepeatability(places.map((place) => place.repeats));

/**
 * Scatter of a reading, or the division it is read to, whichever is larger: repeats read on a scale
 * already show its division (ISO 14253-2, from memory). A comparative zero is one reading more.
 */
export const readingLines = (
  sheet: BoreSheet,
  places: readonly Place[],
  gauge: Gauge<'length'>,
): readonly UncertaintyComponent[] => {
  const found = sheetRepeatability(sheet, places);
  const scatter = found?.standardDeviation ?? USUAL_REPEATABILITY;
  const zeroReadings = sheet.method === 'comparative' ? 1 : 0;
  const words = 'the dial’s division';
  if (scatter < resolutionOf(gauge, words).standardUncertainty)
    return [resolutionOf(gauge, words, 1 + zeroReadings)];
  const repeats =
    places.length === 0 ? 1 : Math.min(...places.map((place) => place.repeats.length));
  const name = found === null ? 'repeatability: usual' : 'repeatability';
  const dof = found === null ? {} : { degreesOfFreedom: found.degreesOfFreedom };
  return [
    line(name, scatter, 'the hand’s repeatability', {
      sensitivity: 1 / Math.sqrt(repeats),
      ...dof,
    }),
    ...(zeroReadings === 0 ? [] : [resolutionOf(gauge, words)]),
  ];
};
