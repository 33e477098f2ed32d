import { assess } from '../../decision/assess';
import type { LimitRequirement } from '../../decision/requirement';
import { type BudgetLine, budgetLines } from '../../measurement/budget';
import { combine } from '../../measurement/uncertainty';
import type { BoreSheet } from '../bore-sheet';
import { sheetBudget } from '../sheet-budget';

/** What a clearance is about to be measured with. */
export type Kit = Pick<
  BoreSheet,
  'method' | 'gauge' | 'lifterGauge' | 'settingRing' | 'zeroSize' | 'repeatability'
>;

export interface KitFitness {
  readonly fit: boolean;
  readonly ratio: number | null;
  /** In metres. */
  readonly expandedUncertainty: number;
  /** Largest first: what to improve. */
  readonly budget: readonly BudgetLine[];
}

/** Is this kit fit for this rule? Asked before a reading is taken, by the same budget and the same bar. */
export const kitFitness = (
  kit: Kit,
  requirement: LimitRequirement<'length'>,
): KitFitness | null => {
  const value = requirement.limits.max ?? requirement.limits.min;
  if (value === undefined) return null;
  const components = sheetBudget({ ...kit, unit: value.unit, lifter: [], bore: [] }, [], null);
  const { fit, ratio, expandedUncertainty } = assess(requirement, {
    value,
    ...combine(components),
  });
  return { fit, ratio, expandedUncertainty, budget: budgetLines(components) };
};
