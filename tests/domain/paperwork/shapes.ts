/** Sheets as people make them: the same engine, `lifter` and `bore` of each place, in many shapes. */
export const ORDER = [
  '1 exhaust',
  '1 intake',
  '3 intake',
  '3 exhaust',
  '5 exhaust',
  '5 intake',
  '7 intake',
  '7 exhaust',
  '2 exhaust',
  '2 intake',
  '4 intake',
  '4 exhaust',
  '6 exhaust',
  '6 intake',
  '8 intake',
  '8 exhaust',
] as const;

export const lifterAt = (i: number): string => `0.84${22 + (i % 3)}`;
export const boreAt = (i: number): string => `0.84${39 + (i % 3)}`;
export const millimetres = (inches: string, decimals = 4): string =>
  (Number(inches) * 25.4).toFixed(decimals);

const split = (position: string): readonly [string, string] => {
  const [cylinder = '', valve = ''] = position.split(' ');
  return [cylinder, valve];
};

const lines = (rows: readonly (readonly string[])[], delimiter = ','): string =>
  rows.map((row) => row.join(delimiter)).join('\n');

const body = (row: (position: string, i: number) => readonly string[]) => ORDER.map(row);

const comma = (text: string): string => text.replace('.', ',');

export interface Shape {
  readonly name: string;
  readonly bytes: Uint8Array;
  /** Unit of the numbers as they come out. */
  readonly unit: 'in' | 'mm';
}

const utf8 = (text: string): Uint8Array => new TextEncoder().encode(text);
const utf16 = (text: string): Uint8Array => {
  const units = new Uint16Array([0xfeff, ...[...text].map((char) => char.charCodeAt(0))]);
  return new Uint8Array(units.buffer);
};

const shape = (name: string, text: string, unit: Shape['unit'] = 'in'): Shape => ({
  name,
  bytes: utf8(text),
  unit,
});

const byRow = body((p, i) => [p, lifterAt(i), boreAt(i)]);

const cylinders = ['1', '2', '3', '4', '5', '6', '7', '8'] as const;
const at = (position: string): number => ORDER.indexOf(position as (typeof ORDER)[number]);

export const SHAPES: readonly Shape[] = [
  shape('the plain one', lines([['Position', 'Lifter body', 'Tappet bore'], ...byRow])),
  shape(
    'other column order, short names, units in headings',
    lines([
      ['Bore (in)', 'Lifter (in.)', 'No'],
      ...body((p, i) => {
        const [cylinder, valve] = split(p);
        return [boreAt(i), lifterAt(i), `${cylinder}${valve === 'intake' ? 'I' : 'E'}`];
      }),
    ]),
  ),
  shape(
    'semicolons and decimal commas',
    lines(
      [
        ['Position', 'Lifter body', 'Lifter bore'],
        ...byRow.map(([p, l, b]) => [p!, comma(l!), comma(b!)]),
      ],
      ';',
    ),
  ),
  shape(
    'byte-order mark',
    `\uFEFF${lines([['Position', 'Lifter body', 'Tappet bore'], ...byRow])}`,
  ),
  shape(
    'merged title rows above',
    lines([
      ['Engine VR-2231 lifter sheet', '', ''],
      ['measured 2026-05-02', '', ''],
      ['', '', ''],
      ['Position', 'Lifter body diameter (in)', 'Tappet bore diameter (in)'],
      ...byRow,
    ]),
  ),
  shape(
    'units in the cells',
    lines([
      ['Position', 'Lifter', 'Bore'],
      ...body((p, i) => [p, `${lifterAt(i)} in`, `${boreAt(i)}"`]),
    ]).replaceAll('"', '″'),
  ),
  shape(
    'millimetres in headings',
    lines([
      ['Pos.', 'Lifter [mm]', 'Bore [mm]'],
      ...body((p, i) => [p, millimetres(lifterAt(i)), millimetres(boreAt(i))]),
    ]),
    'mm',
  ),
  shape(
    'millimetres, three decimals after a comma, tabs',
    lines(
      [
        ['Position', 'Lifter mm', 'Bore mm'],
        ...body((p, i) => [
          p,
          comma(millimetres(lifterAt(i), 3)),
          comma(millimetres(boreAt(i), 3)),
        ]),
      ],
      '\t',
    ),
    'mm',
  ),
  shape(
    'cylinder and valve in two columns',
    lines([
      ['Cyl', 'Valve', 'Lifter', 'Bore'],
      ...body((p, i) => [...split(p), lifterAt(i), boreAt(i)]),
    ]),
  ),
  shape(
    'one row a cylinder, intake and exhaust beside each other',
    lines([
      ['Cylinder', 'Intake lifter', 'Intake bore', 'Exhaust lifter', 'Exhaust bore'],
      ...cylinders.map((c) => [
        c,
        lifterAt(at(`${c} intake`)),
        boreAt(at(`${c} intake`)),
        lifterAt(at(`${c} exhaust`)),
        boreAt(at(`${c} exhaust`)),
      ]),
    ]),
  ),
  shape(
    'titles over two rows, the upper one merged over its columns',
    lines([
      ['', 'Intake', '', 'Exhaust', ''],
      ['Cyl.', 'lifter', 'bore', 'lifter', 'bore'],
      ...cylinders.map((c) => [
        c,
        lifterAt(at(`${c} intake`)),
        boreAt(at(`${c} intake`)),
        lifterAt(at(`${c} exhaust`)),
        boreAt(at(`${c} exhaust`)),
      ]),
    ]),
  ),
  shape(
    'quoted cells, blank rows between, notes column, CRLF',
    lines([
      ['"Position"', '"Lifter, body"', '"Bore, tappet"', '"Remarks"'],
      ...byRow.flatMap((row, i) =>
        [[...row.map((cell) => `"${cell}"`), i === 4 ? '"re-honed, ""B"" ring"' : '']].concat(
          i % 4 === 3 ? [['', '', '', '']] : [],
        ),
      ),
    ]).replaceAll('\n', '\r\n'),
  ),
  {
    name: 'UTF-16 as a spreadsheet saves “Unicode text”',
    bytes: utf16(lines([['Position', 'Lifter body', 'Tappet bore'], ...byRow], '\t')),
    unit: 'in',
  },
  shape('“sep=;” first', `sep=;\n${lines([['Position', 'Lifter', 'Bore'], ...byRow], ';')}`),
  shape(
    'rows in another order, places written every way',
    lines([
      ['Where', 'Lifter', 'Bore'],
      ...body((p, i) => {
        const [cylinder, valve] = split(p);
        const ways = [
          `#${cylinder} ${valve}`,
          `${valve === 'intake' ? 'Int.' : 'Exh.'} ${cylinder}`,
          `Cyl ${cylinder} ${valve === 'intake' ? 'In' : 'Ex'}`,
          `${valve === 'intake' ? 'I' : 'E'}-${cylinder}`,
        ];
        return [ways[i % 4]!, lifterAt(i), boreAt(i)];
      }).toReversed(),
    ]),
  ),
  shape(
    'trailing totals and an average row',
    lines([['Position', 'Lifter', 'Bore'], ...byRow, ['Average', '0.8423', '0.8440']]),
  ),
];
