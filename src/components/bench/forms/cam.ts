import { type Field, type FieldGroup, lengthUnit, type Typed } from '../fields';
import { chosen } from '../typed';

const event = (name: string, label: string): Field => ({
  name,
  label,
  kind: 'number',
  pointer: `/inputs/${name}`,
});

export const eventsForm: readonly FieldGroup[] = [
  {
    legend: 'Valve events',
    hint: 'Crankshaft degrees, all at the same lift. On the other side of its dead centre an event is minus.',
    fields: [
      event('intakeOpens', 'Intake opens before top dead centre'),
      event('intakeCloses', 'Intake closes after bottom dead centre'),
      event('exhaustOpens', 'Exhaust opens before bottom dead centre'),
      event('exhaustCloses', 'Exhaust closes after top dead centre'),
    ],
  },
];

const EVENTS = ['intakeOpens', 'intakeCloses', 'exhaustOpens', 'exhaustCloses'];

export const eventsBody = (typed: Typed): unknown => ({
  quantity: 'valve-events',
  inputs: Object.fromEntries(EVENTS.map((name) => [name, typed[name]])),
});

export const tableForm: readonly FieldGroup[] = [
  {
    legend: 'Lift table',
    fields: [
      lengthUnit('unit', '/inputs/unit', 'Unit of lift'),
      {
        name: 'checkingLift',
        label: 'Checking lift',
        kind: 'number',
        pointer: '/inputs/checkingLift',
      },
      {
        name: 'table',
        label: 'Degree and lift, a pair a line',
        hint: 'Crankshaft degrees rising, over both flanks: 98 0.045',
        kind: 'lines',
        rows: 10,
        pointer: '/inputs/table',
      },
    ],
  },
];

export const tableBody = (typed: Typed): unknown => ({
  quantity: 'duration',
  inputs: {
    unit: chosen(tableForm, typed, 'unit'),
    checkingLift: typed['checkingLift'],
    table: typed['table']
      ?.split(/\r?\n/)
      .map((line) => line.trim().split(/[\s;]+/))
      .filter((row) => row.join('') !== ''),
  },
});

export const liftForm: readonly FieldGroup[] = [
  {
    legend: 'Lift at the valve',
    fields: [
      lengthUnit('unit', '/inputs/unit'),
      { name: 'lobeLift', label: 'Lobe lift', kind: 'number', pointer: '/inputs/lobeLift' },
      {
        name: 'rockerRatio',
        label: 'Rocker ratio',
        kind: 'number',
        pointer: '/inputs/rockerRatio',
      },
      {
        name: 'lash',
        label: 'Lash at the valve',
        hint: 'Empty for a hydraulic lifter, checked with a solid one.',
        kind: 'number',
        optional: true,
        pointer: '/inputs/lash',
      },
    ],
  },
];

export const liftBody = (typed: Typed): unknown => ({
  quantity: 'lift',
  inputs: {
    unit: chosen(liftForm, typed, 'unit'),
    lobeLift: typed['lobeLift'],
    rockerRatio: typed['rockerRatio'],
    lash: typed['lash'],
  },
});

export const camExamples = {
  events: '?of=events&intakeOpens=6&intakeCloses=42&exhaustOpens=48&exhaustCloses=12',
  table: `?of=table&unit=in&checkingLift=0.050&table=${encodeURIComponent('90 0.000\n98 0.045\n102 0.055\n200 0.300\n319 0.053\n322 0.047\n340 0.000')}`,
  lift: '?of=lift&unit=in&lobeLift=0.300&rockerRatio=1.5&lash=0.020',
} as const;
