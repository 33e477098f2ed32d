import { assess } from '../../decision/assess';
import type { Assessment, LimitRequirement as Decision } from '../../decision/requirement';
import { budgetLines } from '../../measurement/budget';
import { convert } from '../../quantity/convert';
import type { Written } from '../../quantity/dimension';
import { asciiIn, formatWidth } from '../../quantity/format';
import { decimalsOf } from '../../quantity/number-text';
import { compareQuantities, minus, type Quantity } from '../../quantity/quantity';
import type { BudgetWords, PositionResult, State } from '../clause-result';
import { writtenWords } from '../describe';
import type { Figure } from '../limit';
import type { RuleDimension } from '../quantities/entry';
import { getWritten } from './decision-of';
import type { NumberFact, Position } from './facts';

const WORDS = {
  within: 'within',
  outside: 'outside',
  'too-close': 'too close to call',
} as const;

const UNFIT = 'no statement, since the gauge is not fit for this rule';

/** With the limit's places at least; exact where that is short, else two places more than the limit. */
const readable = (value: Quantity, places: number): Written => {
  const own = decimalsOf(value.text);
  const decimals = own <= places + 3 ? Math.max(own, places) : places + 2;
  return { text: asciiIn(value, value.unit, decimals), unit: value.unit };
};

const placesIn = (bound: Quantity | undefined, unit: string): number => {
  if (bound === undefined) return 0;
  return decimalsOf(bound.unit === unit ? bound.text : convert(bound, unit).text);
};

export interface Held {
  readonly position: Position;
  readonly fact: NumberFact;
  /** As the rule rounds it, where it does. */
  readonly compared: Quantity<RuleDimension>;
  readonly decision: Decision<RuleDimension>;
  /** By how much a gauge past its due day may be off on the ring and still count. */
  readonly ringCheck?: Written | undefined;
  readonly unit: string;
  readonly figure?: Figure | undefined;
  readonly advisory: boolean;
  readonly limit: string;
}

/** Why this number cannot support a breach under this clause; nothing where a ring check makes up for it. */
export const weaknessOf = ({
  fact,
  ringCheck,
}: Pick<Held, 'fact' | 'ringCheck'>): string | undefined => {
  const { cannotSupportBreach, liftedBy } = fact;
  if (cannotSupportBreach === undefined || liftedBy === undefined || ringCheck === undefined)
    return cannotSupportBreach;
  return compareQuantities(liftedBy.off, getWritten(ringCheck, 'length')) <= 0
    ? undefined
    : `${cannotSupportBreach}; ${liftedBy.words}, ${writtenWords(ringCheck)} is allowed`;
};

/** Asked of a gauge that is known. */
const isUnfit = ({ fact }: Held, { fit }: Assessment<RuleDimension>): boolean =>
  !fit && fact.assumedGauge !== true;

const stateOf = (held: Held, assessment: Assessment<RuleDimension>): State => {
  if (held.fact.noStatement !== undefined || isUnfit(held, assessment)) return 'no-statement';
  const breach = assessment.complies === false && weaknessOf(held) !== undefined;
  return breach ? 'no-statement' : assessment.assessment;
};

const ending = (held: Held, assessment: Assessment<RuleDimension>, state: State): string => {
  if (state !== 'no-statement') return `: ${WORDS[assessment.assessment]}.`;
  if (held.fact.noStatement !== undefined) return `: no statement, since ${held.fact.noStatement}.`;
  if (isUnfit(held, assessment)) return `: ${UNFIT}.`;
  return `: no statement, since ${weaknessOf(held) ?? 'the reading cannot support one'}.`;
};

/** The acceptance window less the limits, on the side that has one. */
const guardOf = (
  { acceptance }: Assessment<RuleDimension>,
  { limits }: Decision<RuleDimension>,
  unit: string,
  places: number,
): Written | undefined => {
  const ends = [
    [acceptance?.max, limits.max],
    [acceptance?.min, limits.min],
  ] as const;
  for (const [accepted, limit] of ends) {
    if (accepted === undefined || limit === undefined) continue;
    const moved = minus(accepted, limit);
    if (moved.value.n === 0n) return undefined;
    const width = moved.value.n < 0n ? minus(limit, accepted) : moved;
    return { text: asciiIn(width, unit, places), unit };
  }
  return undefined;
};

const budgetOf = ({ budget = [] }: NumberFact): { readonly budget?: readonly BudgetWords[] } => {
  const lines = budgetLines(budget).map(({ sentence, share }) => ({
    words: sentence,
    share: (share * 100).toFixed(0),
  }));
  return lines.length === 0 ? {} : { budget: lines };
};

/** One number held against one window, by the decision room; the words come from its numbers. */
export const heldNumber = (held: Held): PositionResult => {
  const { fact, decision, position, unit } = held;
  const assessment = assess(decision, {
    value: held.compared,
    standardUncertainty: fact.standardUncertainty,
    degreesOfFreedom: fact.degreesOfFreedom,
  });
  const bounds = [decision.limits.min, decision.limits.max];
  const places = Math.min(7, Math.max(...bounds.map((bound) => placesIn(bound, unit))));
  const shown = held.compared.unit === unit ? held.compared : convert(held.compared, unit);
  const value = readable(shown, places);
  const state = stateOf(held, assessment);
  const silent = state === 'no-statement' || (held.advisory && assessment.complies === false);
  const spread = fact.standardUncertainty > 0;
  const uncertainty: Written = {
    text: formatWidth(shown.dimension, assessment.expandedUncertainty, unit, places + 1),
    unit,
  };
  const guardBand = guardOf(assessment, decision, unit, places + 1);
  const figure = held.figure === undefined ? '' : `${held.figure} `;
  const reach = spread ? ` ± ${writtenWords(uncertainty)}` : '';
  return {
    position: position.key,
    state,
    pass: silent ? null : assessment.complies,
    fit: fact.assumedGauge === true ? null : assessment.fit && fact.noStatement === undefined,
    figure: held.figure,
    value,
    exact: { text: shown.text, unit: shown.unit },
    ...(spread
      ? {
          uncertainty,
          coverageFactor: assessment.coverageFactor.toFixed(2),
          ...budgetOf(fact),
        }
      : {}),
    ...(guardBand === undefined ? {} : { guardBand }),
    ...((fact.checked ?? []).length === 0 ? {} : { checked: fact.checked }),
    sentence: `${position.label}: ${figure}${writtenWords(value)}${reach}; ${held.limit}${ending(held, assessment, state)}`,
    rule: assessment.sentence,
  };
};

/** A position without a number: never measured, or tried and out of reach. */
export const missingAt = (position: Position, outOfReach: boolean): PositionResult => ({
  position: position.key,
  state: outOfReach ? 'could-not-be-reached' : 'not-measured',
  pass: null,
  fit: null,
  sentence: `${position.label}: ${outOfReach ? 'could not be reached' : 'not measured'}.`,
});
