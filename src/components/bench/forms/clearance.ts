import { type FieldGroup, lengthUnit, MATERIAL_HINT, type Typed } from '../fields';
import { chosen } from '../typed';

export const clearanceForm: readonly FieldGroup[] = [
  {
    legend: 'Readings',
    fields: [
      lengthUnit('unit', '/unit'),
      {
        name: 'method',
        label: 'Method',
        kind: 'choice',
        options: [
          { value: 'comparative', label: 'comparative: dial readings from a zero' },
          { value: 'absolute', label: 'absolute: diameters' },
        ],
        initial: 'comparative',
        pointer: '/method',
      },
      {
        name: 'bore',
        label: 'Bore, a depth a line from the top',
        hint: 'Axes side by side: 0.8440 0.8441. True repeats of one place with a stroke: 0.8440/0.8441. A dash where none was taken.',
        kind: 'lines',
        rows: 4,
        pointer: '/bore',
      },
      {
        name: 'lifter',
        label: 'Lifter body, several readings side by side',
        hint: 'At its widest, off the oil groove and holes. May stay empty when the zero is on this lifter.',
        kind: 'text',
        optional: true,
        pointer: '/lifter',
      },
    ],
  },
  {
    legend: 'Dial and zero',
    fields: [
      {
        name: 'reads',
        label: 'A larger bore reads',
        kind: 'choice',
        options: [
          { value: 'plus', label: 'plus' },
          { value: 'minus', label: 'minus' },
        ],
        initial: 'plus',
        hint: 'Checked by thumb: on many dials a larger bore reads minus.',
        pointer: '/largerReads',
      },
      {
        name: 'ring',
        label: 'Setting ring’s size',
        hint: 'Empty: the zero is this lifter at its widest.',
        kind: 'number',
        optional: true,
        pointer: '/zeroSize',
      },
      {
        name: 'division',
        label: 'Dial division',
        kind: 'number',
        optional: true,
        pointer: '/division',
      },
      {
        name: 'opening',
        label: 'Opening zero',
        kind: 'number',
        optional: true,
        pointer: '/openingZero',
      },
      {
        name: 'closing',
        label: 'Closing zero',
        kind: 'number',
        optional: true,
        pointer: '/closingZero',
      },
    ],
  },
  {
    legend: 'Temperatures, if logged',
    fields: [
      {
        name: 'tbore',
        label: 'Block',
        hint: 'With its unit: 60 °C or 140 °F.',
        kind: 'text',
        optional: true,
        pointer: '/temperatures/bore',
      },
      {
        name: 'tlifter',
        label: 'Lifter',
        kind: 'text',
        optional: true,
        pointer: '/temperatures/lifter',
      },
      {
        name: 'mbore',
        label: 'Block’s material',
        hint: MATERIAL_HINT,
        kind: 'text',
        initial: 'iron',
        pointer: '/materials/bore',
      },
      {
        name: 'mlifter',
        label: 'Lifter’s material',
        kind: 'text',
        initial: 'steel',
        pointer: '/materials/lifter',
      },
    ],
  },
];

const words = (text: string | undefined): string[] =>
  (text ?? '').split(/[\s;]+/).filter((word) => word !== '');

const cell = (word: string): string | string[] | null => {
  if (/^[-–x]$/i.test(word)) return null;
  return word.includes('/') ? word.split('/') : word;
};

export const clearanceBody = (typed: Typed): unknown => {
  const { tbore, tlifter } = typed as { tbore?: string; tlifter?: string };
  const logged = tbore !== undefined || tlifter !== undefined;
  const bore = typed['bore']
    ?.split(/\r?\n/)
    .map((line) => words(line).map(cell))
    .filter((row) => row.length > 0);
  return {
    unit: chosen(clearanceForm, typed, 'unit'),
    method: chosen(clearanceForm, typed, 'method'),
    lifter: words(typed['lifter']),
    bore,
    largerReads: chosen(clearanceForm, typed, 'reads'),
    zeroSize: typed['ring'],
    division: typed['division'],
    openingZero: typed['opening'],
    closingZero: typed['closing'],
    temperatures: logged ? { bore: tbore, lifter: tlifter } : undefined,
    materials: {
      bore: chosen(clearanceForm, typed, 'mbore'),
      lifter: chosen(clearanceForm, typed, 'mlifter'),
    },
  };
};

export const clearanceExample = `?unit=in&method=absolute&bore=${encodeURIComponent('0.8440/0.8440 0.8441/0.8440\n0.8439/0.8440 0.8440/0.8440')}&lifter=0.8422+0.8423&division=0.0001`;
