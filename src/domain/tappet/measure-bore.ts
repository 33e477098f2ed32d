import { DEFAULT_FIT_RATIO } from '../decision/fitness';
import { type BudgetLine, budgetLines } from '../measurement/budget';
import { divisionOf } from '../measurement/gauge-figures';
import { bearable, type TemperatureAdvice, temperatureAdvice } from '../measurement/hold';
import { combine } from '../measurement/uncertainty';
import { baseNumber } from '../quantity/convert';
import { quantityOf } from '../quantity/quantity';
import { type Rational, sub, toNumber } from '../quantity/rational';
import type { BoreSheet, Length } from './bore-sheet';
import { sheetRepeatability } from './budget/reading-lines';
import { temperatureBudget } from './budget/temperature-budget';
import { missingOf } from './checks/missing';
import { warningsOf } from './checks/warnings';
import { type Clearance, clearanceOf, type Diameters, diametersOf } from './clearance';
import { clearanceAt20 } from './clearance-at-20';
import { correctedReadings, driftOf } from './dial';
import { outOfRound, taperOf } from './form/form';
import type { Shape } from './form/shape';
import { placesOf } from './places';
import { mustRedo } from './redo';
import { DIAL, sheetBudget } from './sheet-budget';

export interface ClearanceFigures {
  readonly mean: Length;
  readonly min: Length;
  readonly max: Length;
}

/** What one bore's sheet comes to, by docs/definitions.md. Lengths are exact, in the sheet's unit. */
export interface BoreMeasurement {
  /** `null` when readings it needs are missing. */
  readonly clearance: ClearanceFigures | null;
  readonly clearanceAt20C?: ClearanceFigures;
  /** Where temperatures were logged and the window is known. */
  readonly temperatureAdvice?: TemperatureAdvice;
  /** `null` where no depth has two axes. */
  readonly outOfRound: Length | null;
  /** `null` with fewer than two depths. */
  readonly taper: {
    readonly depthMeans: Length;
    readonly worstAxis: Length;
    readonly signed: Length;
    readonly shape: Shape;
  } | null;
  readonly drift?: Length;
  readonly redo: boolean;
  /** Of a clearance at a place, in metres. */
  readonly standardUncertainty: number;
  readonly degreesOfFreedom: number | null;
  readonly missing: readonly string[];
  readonly warnings: readonly string[];
  /** Largest first. */
  readonly budget: readonly BudgetLine[];
}

/** From the readings of one bore and its lifter to clearance, form and uncertainty. */
export const measureBore = (sheet: BoreSheet): BoreMeasurement => {
  const length = (value: Rational): Length => quantityOf('length', value, sheet.unit);
  const figures = ({ mean, min, max }: Clearance): ClearanceFigures => ({
    mean: length(mean),
    min: length(min),
    max: length(max),
  });
  const places = placesOf(correctedReadings(sheet));
  const now = diametersOf(sheet, places);
  const clearance = now && clearanceOf(now.bores, now.lifters);
  const settled = now && clearanceAt20(sheet, now);
  const advice = settled && clearance && adviceFor(sheet, now, sub(settled.mean, clearance.mean));
  const division = divisionOf(sheet.gauge ?? DIAL);
  const round = outOfRound(places);
  const taper = taperOf(places, division);
  const drift = driftOf(sheet.zeros);
  const redo = mustRedo(sheet.zeros, division, sheet.window?.value);
  const budget = budgetLines(sheetBudget(sheet, places, now));
  return {
    clearance: clearance && figures(clearance),
    ...(settled && { clearanceAt20C: figures(settled) }),
    ...(advice && { temperatureAdvice: advice }),
    outOfRound: round && length(round),
    taper: taper && {
      depthMeans: length(taper.depthMeans),
      worstAxis: length(taper.worstAxis),
      signed: length(taper.signed),
      shape: taper.shape,
    },
    ...(drift && { drift: length(drift) }),
    redo,
    ...combine(budget),
    missing: missingOf(sheet),
    warnings: warningsOf(sheet, {
      clearance,
      advice,
      repeatability: sheetRepeatability(sheet, places),
      redo,
    }),
    budget,
  };
};

const adviceFor = (
  sheet: BoreSheet,
  now: Diameters,
  correction: Rational,
): TemperatureAdvice | undefined => {
  if (sheet.window === undefined) return undefined;
  const bears = bearable(baseNumber(sheet.window), Number(sheet.fitRatio ?? DEFAULT_FIT_RATIO));
  return temperatureAdvice(toNumber(correction), temperatureBudget(sheet, now), bears);
};
