import type { Field, FieldGroup, Typed } from '../fields';
import { chosen, numberOr } from '../typed';

const LINES = 8;
const lines = Array.from({ length: LINES }, (_, i) => i + 1);

const column =
  (key: string, label: string, kind: Field['kind']) =>
  (i: number): Field => ({
    name: `${key}${i}`,
    label: `${label}, line ${i}`,
    kind,
    optional: true,
    pointer: '',
  });

export const COLUMNS = [
  { key: 'name', label: 'Source', kind: 'text', part: 'name' },
  { key: 'u', label: 'Standard uncertainty', kind: 'number', part: 'standardUncertainty' },
  { key: 'c', label: 'Sensitivity', kind: 'number', part: 'sensitivity' },
  { key: 'v', label: 'Degrees of freedom', kind: 'number', part: 'degreesOfFreedom' },
] as const;

export const unitGroup: FieldGroup = {
  legend: 'Unit and level',
  fields: [
    { name: 'unit', label: 'Unit', kind: 'text', initial: 'in', pointer: '/unit' },
    {
      name: 'level',
      label: 'Level of confidence',
      hint: 'Two-sided; 0.95 unless the rule says otherwise.',
      kind: 'number',
      initial: '0.95',
      pointer: '/level',
    },
  ],
};

/** The lines that hold anything, in order: empty ones are passed over, so places shift. */
const filled = (typed: Typed): readonly number[] =>
  lines.filter((i) => COLUMNS.some(({ key }) => typed[`${key}${i}`] !== undefined));

/** With the fields' pointers as this visitor filled the lines. */
export function uncertaintyForm(typed: Typed): readonly FieldGroup[] {
  const order = filled(typed);
  return [
    unitGroup,
    {
      legend: 'Budget',
      fields: lines.flatMap((i) =>
        COLUMNS.map(({ key, label, kind, part }) => ({
          ...column(key, label, kind)(i),
          pointer: order.includes(i)
            ? `/components/${order.indexOf(i)}/${part}`
            : `/unused/${key}${i}`,
        })),
      ),
    },
  ];
}

export const uncertaintyBody = (typed: Typed): unknown => ({
  unit: chosen([unitGroup], typed, 'unit'),
  level: numberOr(chosen([unitGroup], typed, 'level')),
  components: filled(typed).map((i) => ({
    name: typed[`name${i}`] ?? `line ${i}`,
    standardUncertainty: typed[`u${i}`],
    sensitivity: typed[`c${i}`],
    degreesOfFreedom: numberOr(typed[`v${i}`]),
  })),
});

export const uncertaintyLines = lines;

export const uncertaintyExample = `?unit=in&level=0.95&${[
  ['the dial’s division', '0.0000289', '1.414', ''],
  ['repeatability', '0.00004', '1', '9'],
  ['calibration', '0.00003', '1', ''],
  ['setting the zero', '0.00003', '1', ''],
]
  .map(([name, u, c, v], i) =>
    new URLSearchParams({
      [`name${i + 1}`]: name ?? '',
      [`u${i + 1}`]: u ?? '',
      [`c${i + 1}`]: c ?? '',
      [`v${i + 1}`]: v ?? '',
    }).toString(),
  )
  .join('&')}`;
