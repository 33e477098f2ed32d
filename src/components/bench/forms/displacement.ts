import { type FieldGroup, lengthUnit, type Typed } from '../fields';
import { chosen, numberOr } from '../typed';

export const displacementForm: readonly FieldGroup[] = [
  {
    legend: 'Sizes',
    fields: [
      lengthUnit('unit', '/inputs/unit'),
      { name: 'bore', label: 'Bore', kind: 'number', pointer: '/inputs/bore' },
      { name: 'stroke', label: 'Stroke', kind: 'number', pointer: '/inputs/stroke' },
      {
        name: 'cylinders',
        label: 'Cylinders',
        kind: 'number',
        initial: '8',
        pointer: '/inputs/cylinders',
      },
      {
        name: 'round',
        label: 'Rounding',
        kind: 'choice',
        options: [
          { value: 'no', label: 'as it is' },
          { value: 'up', label: 'up to the next whole unit' },
        ],
        initial: 'no',
        hint: 'A rule may round up the limit or the measured value: it has to say which.',
        pointer: '/inputs/roundUp',
      },
    ],
  },
  {
    legend: 'Standard uncertainties, if known',
    hint: 'One standard deviation each, in the unit above.',
    fields: [
      {
        name: 'ubore',
        label: 'of the bore',
        kind: 'number',
        optional: true,
        pointer: '/inputs/uncertainties/bore',
      },
      {
        name: 'ustroke',
        label: 'of the stroke',
        kind: 'number',
        optional: true,
        pointer: '/inputs/uncertainties/stroke',
      },
    ],
  },
];

/** The request that the form stands for. */
export const displacementBody = (typed: Typed): unknown => {
  const cylinders = chosen(displacementForm, typed, 'cylinders');
  return {
    quantity: 'displacement',
    inputs: {
      unit: chosen(displacementForm, typed, 'unit'),
      bore: typed['bore'],
      stroke: typed['stroke'],
      cylinders: numberOr(cylinders),
      roundUp: typed['round'] === 'up',
      uncertainties: { bore: typed['ubore'], stroke: typed['ustroke'] },
    },
  };
};

export const displacementExample =
  '?unit=in&bore=4.065&stroke=3.480&cylinders=8&round=up&ubore=0.0003&ustroke=0.001';
