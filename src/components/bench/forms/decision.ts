import type { FieldGroup, Typed } from '../fields';
import { chosen, numberOr } from '../typed';

export const decisionForm: readonly FieldGroup[] = [
  {
    legend: 'Measured',
    fields: [
      { name: 'value', label: 'Value', kind: 'number', pointer: '/value' },
      {
        name: 'unit',
        label: 'Unit',
        hint: 'in, mm, thou, cc, in³, lb, lbf, N, psi, kPa, deg, 1 (ratio), %',
        kind: 'text',
        initial: 'in',
        pointer: '/unit',
      },
      {
        name: 'u',
        label: 'Standard uncertainty',
        hint: 'One standard deviation, in the same unit; 0 for a simple comparison.',
        kind: 'number',
        pointer: '/standardUncertainty',
      },
      {
        name: 'dof',
        label: 'Degrees of freedom',
        hint: 'Empty: known well enough for the normal distribution.',
        kind: 'number',
        optional: true,
        pointer: '/degreesOfFreedom',
      },
    ],
  },
  {
    legend: 'Limit',
    hint: 'A min, a max, or both, in the same unit.',
    fields: [
      { name: 'min', label: 'Min', kind: 'number', optional: true, pointer: '/requirement/min' },
      { name: 'max', label: 'Max', kind: 'number', optional: true, pointer: '/requirement/max' },
      {
        name: 'decimals',
        label: 'Round to decimals first',
        hint: 'Empty: compared as it is (ASTM E29, absolute method).',
        kind: 'number',
        optional: true,
        pointer: '/requirement/decimals',
      },
    ],
  },
  {
    legend: 'Decision rule',
    fields: [
      {
        name: 'rule',
        label: 'Rule',
        kind: 'choice',
        options: [
          {
            value: 'guarded-rejection',
            label: 'guarded rejection: fails only when a breach is shown',
          },
          {
            value: 'guarded-acceptance',
            label: 'guarded acceptance: passes only when compliance is shown',
          },
          { value: 'simple', label: 'simple acceptance: the value as measured' },
          { value: 'iso14253', label: 'ISO 14253-1: each only when shown' },
          { value: 'ilac-g8-four', label: 'ILAC-G8: four statements' },
        ],
        initial: 'guarded-rejection',
        pointer: '/requirement/decisionRule/kind',
      },
      {
        name: 'probability',
        label: 'One-sided probability',
        hint: 'Empty: 0.95. Or give a factor of U below, not both.',
        kind: 'number',
        optional: true,
        pointer: '/requirement/decisionRule/probability',
      },
      {
        name: 'factor',
        label: 'Guard band as a factor of U',
        kind: 'number',
        optional: true,
        pointer: '/requirement/decisionRule/guardFactor',
      },
      {
        name: 'fit',
        label: 'Smallest window ÷ 2U',
        hint: 'Empty: 2. Below it the gauge is not fit for this rule.',
        kind: 'number',
        optional: true,
        pointer: '/requirement/fitRatio',
      },
      {
        name: 'largest',
        label: 'Largest allowed U',
        hint: 'What makes a gauge fit where the limit is one-sided.',
        kind: 'number',
        optional: true,
        pointer: '/requirement/maximumUncertainty',
      },
    ],
  },
];

export const decisionBody = (typed: Typed): unknown => ({
  requirement: {
    unit: chosen(decisionForm, typed, 'unit'),
    min: typed['min'],
    max: typed['max'],
    decisionRule: {
      kind: chosen(decisionForm, typed, 'rule'),
      probability: numberOr(typed['probability']),
      guardFactor: typed['factor'],
    },
    comparison: typed['decimals'] === undefined ? 'absolute' : 'rounded',
    decimals: numberOr(typed['decimals']),
    fitRatio: typed['fit'],
    maximumUncertainty: typed['largest'],
  },
  value: typed['value'],
  unit: chosen(decisionForm, typed, 'unit'),
  standardUncertainty: typed['u'],
  degreesOfFreedom: numberOr(typed['dof']),
});

export const decisionExample =
  '?value=0.0020&unit=in&u=0.00004&min=0.0013&max=0.0019&rule=guarded-rejection';
