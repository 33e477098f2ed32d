import { type FieldGroup, lengthUnit, MATERIAL_HINT, type Typed } from '../fields';
import { chosen } from '../typed';

export const temperatureForm: readonly FieldGroup[] = [
  {
    legend: 'The part',
    fields: [
      lengthUnit('unit', '/unit'),
      { name: 'length', label: 'Length as read', kind: 'number', pointer: '/length' },
      {
        name: 'temperature',
        label: 'Temperature of the part',
        hint: 'With its unit: 60 °C or 140 °F (60 C and 140 F will do).',
        kind: 'text',
        pointer: '/temperature',
      },
      {
        name: 'material',
        label: 'Material',
        hint: MATERIAL_HINT,
        kind: 'text',
        initial: 'iron',
        pointer: '/material',
      },
      {
        name: 'gauge',
        label: 'Temperature of the gauge',
        hint: 'Empty: 20 °C.',
        kind: 'text',
        optional: true,
        pointer: '/gaugeTemperature',
      },
    ],
  },
];

export const temperatureBody = (typed: Typed): unknown => ({
  unit: chosen(temperatureForm, typed, 'unit'),
  length: typed['length'],
  temperature: typed['temperature'],
  material: chosen(temperatureForm, typed, 'material'),
  gaugeTemperature: typed['gauge'],
});

export const temperatureExample = '?unit=in&length=0.8440&temperature=60+C&material=iron';
