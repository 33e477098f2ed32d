import { type Field, type FieldGroup, lengthUnit, type Typed } from '../fields';
import { chosen } from '../typed';

const size = (name: string, label: string): Field => ({
  name,
  label,
  kind: 'number',
  pointer: `/inputs/${name}`,
});

const unit = (name: string, label: string, values: readonly string[]): Field => ({
  name,
  label,
  kind: 'choice',
  options: values.map((value) => ({ value, label: value })),
  initial: values[0] ?? '',
  pointer: `/inputs/${name}`,
});

export const springForm: readonly FieldGroup[] = [
  {
    legend: 'Spring rate',
    hint: 'Valve springs store energy: compress them in a tester with its guard, eyes protected.',
    fields: [
      lengthUnit('lengthUnit', '/inputs/lengthUnit', 'Unit of height'),
      unit('forceUnit', 'Unit of load', ['lbf', 'N']),
      {
        name: 'points',
        label: 'Height and load, a pair a line',
        hint: 'Two heights or more: 1.700 120',
        kind: 'lines',
        rows: 4,
        pointer: '/inputs/points',
      },
    ],
  },
];

export const springBody = (typed: Typed): unknown => ({
  quantity: 'spring-rate',
  inputs: {
    lengthUnit: chosen(springForm, typed, 'lengthUnit'),
    forceUnit: chosen(springForm, typed, 'forceUnit'),
    points: typed['points']
      ?.split(/\r?\n/)
      .map((line) => line.trim().split(/[\s;]+/))
      .filter((row) => row.join('') !== '')
      .map(([height, load]) => ({ height, load })),
  },
});

export const areaForm: readonly FieldGroup[] = [
  {
    legend: 'Area of a round hole',
    fields: [lengthUnit('unit', '/inputs/unit'), size('diameter', 'Smallest diameter')],
  },
];

export const areaBody = (typed: Typed): unknown => ({
  quantity: 'area',
  inputs: { unit: chosen(areaForm, typed, 'unit'), diameter: typed['diameter'] },
});

const CORNERS = ['leftFront', 'rightFront', 'leftRear', 'rightRear'];

export const weightsForm: readonly FieldGroup[] = [
  {
    legend: 'Weights',
    hint: 'All four wheels on level pads at once; with or without driver and fuel as the rule says.',
    fields: [
      unit('unit', 'Unit of weight', ['lb', 'kg']),
      size('leftFront', 'Left front'),
      size('rightFront', 'Right front'),
      size('leftRear', 'Left rear'),
      size('rightRear', 'Right rear'),
    ],
  },
];

export const weightsBody = (typed: Typed): unknown => ({
  quantity: 'weights',
  inputs: {
    unit: chosen(weightsForm, typed, 'unit'),
    ...Object.fromEntries(CORNERS.map((name) => [name, typed[name]])),
  },
});

export const sizesExamples = {
  spring: `?of=spring&lengthUnit=in&forceUnit=lbf&points=${encodeURIComponent('1.700 120\n1.200 310')}`,
  area: '?of=area&unit=in&diameter=1.375',
  weights: '?of=weights&unit=lb&leftFront=900&rightFront=700&leftRear=790&rightRear=620',
} as const;
