import { DEFAULT_PROBABILITY, type DecisionRule } from '../decision/decision-rule';
import type { Written } from '../quantity/dimension';
import type { HeldAgainst, LimitRequirement, Measurand } from './limit';
import type { Per } from './quantities/entry';
import { getQuantityEntry } from './quantity-catalogue';
import type { Requirement } from './requirement';

/** `0.8420 in`; a ratio stands alone, a degree close up. */
export const writtenWords = ({ text, unit }: Written): string => {
  const number = text.replace('-', '−');
  if (unit === '1') return number;
  return unit === 'deg' ? `${number}°` : `${number} ${unit}`;
};

/** The limit alone: `at least 0.0013 in and at most 0.0019 in`, `0.842 in +0.0005 in −0.0005 in`. */
export const limitWords = (limit: Pick<LimitRequirement, 'min' | 'max' | 'nominal'>): string => {
  if (limit.nominal !== undefined) {
    const { size, plus, minus } = limit.nominal;
    return `${writtenWords(size)} +${writtenWords(plus)} −${writtenWords(minus)}`;
  }
  const min = limit.min === undefined ? [] : [`at least ${writtenWords(limit.min)}`];
  const max = limit.max === undefined ? [] : [`at most ${writtenWords(limit.max)}`];
  return [...min, ...max].join(' and ');
};

const EACH: Readonly<Record<Per, string>> = {
  bore: 'each bore',
  lifter: 'each lifter',
  cylinder: 'each cylinder',
  engine: 'the engine',
  car: 'the car',
};

/** `Valve lift of each bore, largest, at the valve retainer, lash 0.000 in, solid checking lifter`. */
export const measurandWords = (measurand: Measurand): string =>
  [
    `${getQuantityEntry(measurand.quantity).label} of ${EACH[measurand.per]}`,
    measurand.figure,
    measurand.datum,
    measurand.lash && `lash ${writtenWords(measurand.lash)}`,
    measurand.checkingLifter === 'solid' && 'solid checking lifter',
    measurand.checkingLifter === 'as-fitted' && 'lifters as fitted',
  ]
    .filter((part) => typeof part === 'string' && part !== '')
    .join(', ');

const guardWords = (rule: DecisionRule): string => {
  if ('guardFactor' in rule && rule.guardFactor !== undefined) return `${rule.guardFactor} U`;
  const probability = ('probability' in rule ? rule.probability : undefined) ?? DEFAULT_PROBABILITY;
  return `${Number((probability * 100).toPrecision(6))} %`;
};

const ruleWords = (rule: DecisionRule): string => {
  switch (rule.kind) {
    case 'simple':
      return 'the measured value decides';
    case 'guarded-acceptance':
      return `passes only when compliance is shown (${guardWords(rule)})`;
    case 'guarded-rejection':
      return `fails only when a breach is shown (${guardWords(rule)})`;
    case 'iso14253':
      return 'each is stated only when shown (ISO 14253-1)';
    case 'conformance-probability':
      return `passes at a probability of ${guardWords(rule)} of lying within`;
    case 'ilac-g8-four':
      return 'four statements (ILAC-G8:09/2019)';
  }
};

const heldWords = (held: HeldAgainst): readonly string[] => [
  ruleWords(held.decisionRule),
  ...(held.comparison.method === 'rounded'
    ? [`value rounded to ${held.comparison.decimals} decimals first`]
    : []),
  ...(held.fitRatio === undefined ? [] : [`window at least ${held.fitRatio} times 2U`]),
  ...(held.maximumUncertainty === undefined
    ? []
    : [`U at most ${writtenWords(held.maximumUncertainty)}`]),
  ...(held.ringCheck === undefined
    ? []
    : [
        `a gauge past its due day counts when checked on the ring that night to within ${writtenWords(held.ringCheck)}`,
      ]),
];

const limitParts = (limit: LimitRequirement): readonly string[] => [
  `${measurandWords(limit)}: ${limitWords(limit)}`,
  ...(limit.sample.kind === 'some' ? [`a sample of ${limit.sample.count}`] : []),
  ...(limit.rounding === undefined
    ? []
    : [
        `${limit.rounding.of === 'limit' ? 'limit' : 'measured value'} rounded ${
          limit.rounding.direction === 'nearest'
            ? 'to the nearest'
            : limit.rounding.direction + ' to'
        } ${writtenWords(limit.rounding.step)}`,
      ]),
  ...heldWords(limit),
  ...(limit.twoSets === 'each'
    ? [
        'a breach is stated only when two independent sets each show it; sets that differ beyond their uncertainty are measured again',
      ]
    : []),
];

/** The requirement in words, for reading, printing and comparing two points in time. */
export const requirementWords = (requirement: Requirement): string => {
  switch (requirement.kind) {
    case 'limit':
      return limitParts(requirement).join('; ');
    case 'choice':
      return `${requirement.question} Allowed: ${requirement.options
        .filter((option) => requirement.allowed.includes(option.value))
        .map((option) => option.label)
        .join(', ')}; of ${requirement.options.map((option) => option.label).join(', ')}`;
    case 'yes-no':
      return `${requirement.question} Required: ${requirement.required}`;
    case 'matches-paperwork':
      return `${requirement.question} As declared`;
    case 'plug-gauge':
      return requirement.gauge === 'go'
        ? `A ${writtenWords(requirement.size)} gauge must pass ${requirement.where}`
        : `A ${writtenWords(requirement.size)} gauge must not pass ${requirement.where}`;
    case 'reference-average':
      return [
        `${measurandWords(requirement)}: within +${writtenWords(requirement.plus)} −${writtenWords(
          requirement.minus,
        )} of the mean of at least ${requirement.n} reference parts`,
        ...heldWords(requirement),
      ].join('; ');
    case 'photograph':
      return `Photograph showing ${requirement.visible.join(', ')}`;
    case 'sheet':
      return `Sheet: ${requirement.title}`;
    case 'seal':
      return `${requirement.count === 1 ? 'One seal' : `${requirement.count} seals`} at ${requirement.place}`;
  }
};
