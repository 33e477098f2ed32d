import { diameterBudget } from '../inspection/measure/measure-lifter';
import { combine, type UncertaintyComponent } from '../measurement/uncertainty';
import { findAs } from '../quantity/quantity';
import type { Facts, NumberFact } from '../rulebook/evaluate/facts';
import { MICROMETER, sheetBudget } from '../tappet/sheet-budget';

const SHEET = sheetBudget({ unit: 'in', method: 'absolute', lifter: [], bore: [] }, [], null);

/** The budget that the usual gauges give; nothing for quantities that have no usual gauge. */
const usualBudget = ({ quantity, value }: NumberFact): readonly UncertaintyComponent[] => {
  const length = findAs('length', value);
  if (length === undefined) return [];
  switch (quantity) {
    case 'lifter-body-diameter':
    case 'foot-diameter':
      return diameterBudget(length, MICROMETER);
    case 'tappet-bore-diameter':
    case 'tappet-clearance':
      return SHEET;
    default:
      return [];
  }
};

const usually = (fact: NumberFact): NumberFact => {
  const budget = usualBudget(fact);
  return budget.length === 0 || fact.standardUncertainty > 0
    ? fact
    : { ...fact, ...combine(budget), budget, assumedGauge: true };
};

/**
 * Declared lifters and bores with the uncertainty that a micrometer and a dial bore gauge of 0.0001 in
 * usually have (common practice), since a declaration does not name its gauges: for a check before an
 * inspection, which is told as such. Other numbers stay without.
 */
export const withUsualUncertainty = (facts: Facts): Facts => ({
  ...facts,
  numbers: facts.numbers.map(usually),
});
