import { getUnit } from '../quantity/find-unit';
import { valueText, withRealMinus } from '../quantity/format';
import { decimalsOf } from '../quantity/number-text';
import type { Quantity } from '../quantity/quantity';
import type { Rational } from '../quantity/rational';
import { down, halfEven, type Rounding, up } from '../quantity/round';
import { DEFAULT_PROBABILITY, type DecisionRule } from './decision-rule';
import type { LimitRequirement } from './requirement';
import type { Window } from './window';

interface Told {
  readonly requirement: LimitRequirement;
  /** A limit of the requirement: its unit and decimals are those of the sentence. */
  readonly limit: Quantity;
  readonly window: Window;
  readonly accepted: Window | null;
  readonly guard: Rational;
  readonly fit: boolean;
}

/** The decision rule with this requirement's numbers, in one plain sentence for the finding. */
export const ruleSentence = (told: Told): string =>
  `${body(told.requirement.decisionRule, told)}${rounding(told)}${unfit(told)}.`;

const body = (rule: DecisionRule, told: Told): string => {
  const band = `${guardWidth(told)} ${told.limit.unit}`;
  switch (rule.kind) {
    case 'simple':
      return `The value as measured decides: it complies ${range(told.window, told, halfEven, halfEven)}, a value equal to a limit included`;
    case 'guarded-acceptance':
      return told.accepted === null
        ? `A value complies only when it lies inside the limits by its guard band of ${band} (${basis(rule)}), which here leaves no room`
        : `A value complies only when it lies inside the limits by its guard band of ${band} (${basis(rule)}): here ${range(told.accepted, told, up, down)}`;
    case 'guarded-rejection':
      return `A value breaches this clause only when it lies past the limit by more than its guard band of ${band} (${basis(rule)}): here ${range(told.accepted ?? told.window, told, up, down)} the competitor has the benefit of the doubt`;
    case 'iso14253':
      return `A value is called within only when it lies inside the limits by ${band}, and a breach only when it lies past them by more than that (one-sided 95 %); between the two nothing is stated`;
    case 'conformance-probability':
      return `A value complies when it lies within the limits with a probability of at least ${percent(rule.probability)}`;
    case 'ilac-g8-four':
      return `A value passes or fails when all of it, ± ${band}, lies on one side of the limit; otherwise the pass or fail is conditional and a person decides`;
  }
};

const basis = (
  rule: DecisionRule & { guardFactor?: string | undefined; probability?: number | undefined },
): string =>
  rule.guardFactor === undefined
    ? `one-sided ${percent(rule.probability ?? DEFAULT_PROBABILITY)}`
    : rule.guardFactor === '1'
      ? 'the expanded uncertainty U'
      : `${rule.guardFactor} × U`;

const percent = (probability: number): string => `${Number((probability * 100).toPrecision(6))} %`;

const range = (window: Window, told: Told, low: Rounding, high: Rounding): string => {
  const { dimension, unit } = told.limit;
  const end = (at: Rational, way: Rounding): string =>
    `${withRealMinus(valueText(dimension, at, unit, places(told), way))} ${unit}`;
  if (window.low === undefined)
    return window.high === undefined ? 'always' : `up to ${end(window.high.at, high)}`;
  if (window.high === undefined) return `from ${end(window.low.at, low)} up`;
  return `from ${end(window.low.at, low)} to ${end(window.high.at, high)}`;
};

// One place more than the limit is written with: a guard band is rarely a whole division.
const places = ({ limit, requirement }: Told): number =>
  decimalsOf(limit.text) +
  (requirement.decisionRule.kind === 'simple' && requirement.comparison.method === 'absolute'
    ? 0
    : 1);

// Printed so that limit and band add up to an end that holds: the band smaller where it excuses.
const guardWidth = (told: Told): string => {
  const way = told.requirement.decisionRule.kind === 'guarded-rejection' ? down : up;
  const { dimension, unit } = told.limit;
  const { offset } = getUnit(dimension, unit);
  const base =
    dimension === 'temperature' || offset !== undefined ? 'temperature-difference' : dimension;
  const symbol = base === 'temperature-difference' && unit === '°C' ? 'K' : unit;
  return valueText(base, told.guard, symbol, places(told), way);
};

const rounding = ({ requirement: { comparison }, limit }: Told): string =>
  comparison.method === 'absolute'
    ? ''
    : `; values are first rounded, half to even, to ${comparison.decimals} decimals of ${limit.unit}`;

const unfit = ({ fit, requirement: { decisionRule } }: Told): string => {
  if (fit) return '';
  return decisionRule.kind === 'guarded-rejection'
    ? '; the gauge is not fit for this rule, so nothing passes by it, and a breach is confirmed with a fit one'
    : '; the gauge is not fit for this rule';
};
