import { describe, expect, test } from 'vitest';
import { judgeCells } from '@/domain/paperwork/sheet/judge-cells';
import { readSheet } from '@/domain/paperwork/sheet/read-sheet';
import type { WantedSheet } from '@/domain/paperwork/sheet/sheet-cell';
import { toNumber } from '@/domain/quantity/rational';
import { paperworkForm } from '@/domain/rulebook/form/paperwork-form';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { GENERIC_LAYOUTS } from '@/domain/tappet/layout/generic-layouts';
import { readCsv } from '@/services/paperwork/sheet/csv/read-csv';
import { boreAt, lifterAt, ORDER, SHAPES } from './shapes';

const form = paperworkForm(TAPPET_RULE_SET).sheets.find((sheet) => sheet.sheet === 'lifters')!;
const wanted: WantedSheet = { form, layout: GENERIC_LAYOUTS[0]! };
const FILE = { fileId: '01900000-0000-7000-8000-000000000001', name: 'lifters.csv' };

const rowsOf = (bytes: Uint8Array) => {
  const rows = readCsv(bytes);
  if (!rows.ok) throw new Error(rows.failure.detail);
  return rows.value.rows;
};
const read = (text: string, mapping = {}) =>
  readSheet(rowsOf(new TextEncoder().encode(text)), wanted, FILE, mapping);

describe('sheets as people make them', () => {
  test.each(SHAPES)('$name', ({ bytes, unit }) => {
    const sheet = readSheet(rowsOf(bytes), wanted, FILE);
    const judged = judgeCells(sheet.cells);
    expect(judged.filter((cell) => cell.state !== 'ok').map((cell) => cell.detail)).toEqual([]);
    expect(sheet.cells).toHaveLength(32);
    const metres = (position: string, quantity: string) =>
      toNumber(
        judged.find(({ cell }) => cell.position === position && cell.quantity === quantity)!
          .quantity!.value,
      );
    for (const [i, position] of ORDER.entries()) {
      // 0.0005 mm is what three decimals of a millimetre round away.
      expect(metres(position, 'lifter-body-diameter')).toBeCloseTo(Number(lifterAt(i)) * 0.0254, 6);
      expect(metres(position, 'tappet-bore-diameter')).toBeCloseTo(Number(boreAt(i)) * 0.0254, 6);
    }
    expect(new Set(judged.map((cell) => cell.quantity?.unit))).toEqual(new Set([unit]));
  });

  test('every shape is one of its own, and there are enough of them', () => {
    expect(new Set(SHAPES.map(({ bytes }) => bytes.join())).size).toBe(SHAPES.length);
    expect(SHAPES.length).toBeGreaterThanOrEqual(12);
  });

  test('a value says which cell of which file it came from', () => {
    const sheet = read('Title,,\nPosition,Lifter,Bore\n3 intake,0.8422,0.8440\n');
    expect(sheet.cells.map((cell) => cell.source)).toEqual([
      { fileId: FILE.fileId, file: 'lifters.csv', cell: 'B3' },
      { fileId: FILE.fileId, file: 'lifters.csv', cell: 'C3' },
    ]);
  });

  test('what is written stays as written, trailing zeros included', () => {
    expect(read('Position,Lifter\n3 intake,0.8420\n').cells[0]?.typed).toBe('0.8420');
  });

  test('depth and axis in the heading make several readings of one bore', () => {
    const sheet = read(
      'Position,Bore above along,Bore above across,Bore below along,Bore below across\n3I,0.8440,0.8441,0.8439,0.8440\n',
    );
    expect(sheet.cells.map(({ depth, axis }) => `${depth} ${axis}`)).toEqual([
      'above along',
      'above across',
      'below along',
      'below across',
    ]);
  });

  test('two columns of one name are repeats, not one lost', () => {
    const sheet = read('Position,Lifter 1,Lifter 2\n3I,0.8422,0.8423\n');
    expect(sheet.cells.map(({ axis, typed }) => `${axis} ${typed}`)).toEqual([
      '1 0.8422',
      '2 0.8423',
    ]);
  });
});

const good = ORDER.map((p, i) => `${p},${lifterAt(i)},${boreAt(i)}`);
const details = (lines: readonly string[]) =>
  judgeCells(read(['Position,Lifter,Bore', ...lines].join('\n')).cells)
    .filter((cell) => cell.state !== 'ok')
    .map(({ state, detail }) => `${state} ${detail}`);
const swapped = (position: string, line: string) =>
  good.map((row) => (row.startsWith(`${position},`) ? line : row));

describe('bad cells are named and kept', () => {
  test.each([
    [
      'two points',
      '3 intake',
      '3 intake,0.8422,0.84.41',
      'faulty 3 intake, bore: “0.84.41” is no number. Kept as written.',
    ],
    [
      'a letter',
      '3 intake',
      '3 intake,0.8422,0.84O1',
      'faulty 3 intake, bore: “0.84O1” is no number. Kept as written.',
    ],
    [
      'a word',
      '3 intake',
      '3 intake,0.8422,worn',
      'faulty 3 intake, bore: “worn” is no number. Kept as written.',
    ],
    [
      'a weight',
      '3 intake',
      '3 intake,0.8422,96 g',
      'faulty 3 intake, bore: "g" measures a weight; a length is wanted. Kept as written.',
    ],
    [
      'a spreadsheet error',
      '3 intake',
      '3 intake,0.8422,#DIV/0!',
      'faulty 3 intake, bore: “#DIV/0!” is no number. Kept as written.',
    ],
    [
      'a slip of a digit',
      '6 exhaust',
      '6 exhaust,0.8840,0.8860',
      'questioned 6 exhaust, lifter: 0.8840 in, the rest are near 0.8423.',
    ],
    [
      'millimetres in one cell',
      '5 intake',
      '5 intake,21.39,0.8440',
      'questioned 5 intake, lifter: 21.39 in is no size of a lifter or its bore. Is it in millimetres?',
    ],
    [
      'a point out of place',
      '5 intake',
      '5 intake,8.422,0.8440',
      'questioned 5 intake, lifter: 8.422 in is no size of a lifter or its bore. Is it in millimetres?',
    ],
    [
      'a bore smaller than its lifter',
      '7 exhaust',
      '7 exhaust,0.8424,0.8419',
      'questioned 7 exhaust, bore: 0.8419 in is smaller than its lifter, 0.8424 in.',
    ],
  ])('%s', (_name, position, line, expected) => {
    expect(details(swapped(position, line))).toContain(expected);
  });

  test('a questioned value that somebody stands by is asked about no more', () => {
    const { cells } = read(
      ['Position,Lifter,Bore', ...swapped('6 exhaust', '6 exhaust,0.8840,0.8440')].join('\n'),
    );
    const stood = cells.map((cell) =>
      cell.typed === '0.8840' ? { ...cell, confirmed: true } : cell,
    );
    const asked = judgeCells(stood).filter((cell) => cell.state === 'questioned');
    expect(asked.map((cell) => cell.detail)).toEqual([
      '6 exhaust, bore: 0.8440 in is smaller than its lifter, 0.8840 in.',
    ]);
  });

  test('a whole column without its unit is asked about', () => {
    const metric = ORDER.map((p) => `${p},21.39,21.44`);
    const found = details(metric);
    expect(found).toHaveLength(32);
    expect(found[0]).toContain('Is it in millimetres?');
  });

  test('rows and columns that could not be used are named, with what to do', () => {
    const sheet = read(
      'Position,Lifter,Bore,Shoe size\n9 intake,0.8422,0.8440,44\n,0.8422,0.8440,\n3 intake,0.8422,0.8440,\n3I,0.8423,0.8441,\n',
    );
    expect(sheet.notes.map(({ where, detail }) => ({ where, detail }))).toEqual([
      {
        where: 'Row 2',
        detail:
          '“9 intake” is no bore of this engine. Write it such as “3 intake”; its values were not taken.',
      },
      {
        where: 'Row 3',
        detail:
          'It does not say which bore it is for. Write it such as “3 intake”; its values were not taken.',
      },
      {
        where: 'Row 5',
        detail: '3 intake stands here a second time; the first row was taken, this one was not.',
      },
      {
        where: 'Column D',
        detail: '“Shoe size” was not taken. Say below what it holds if it should be.',
      },
    ]);
    expect(sheet.notes.map(({ row }) => row)).toEqual([1, 2, 4, undefined]);
    expect(sheet.cells).toHaveLength(2);
  });

  test('a column the headings do not explain is taken once somebody says what it holds', () => {
    const text = 'Position,OD,ID\n3 intake,0.8422,0.8440\n';
    expect(read(text).cells).toHaveLength(0);
    const reading = (quantity: string) => ({
      kind: 'reading',
      quantity,
      unit: 'in',
      depth: '',
      axis: '',
    });
    const mapping = { OD: reading('lifter-body-diameter'), ID: reading('tappet-bore-diameter') };
    expect(read(text, mapping).cells.map(({ typed }) => typed)).toEqual(['0.8422', '0.8440']);
  });

  test('a file without any place says so', () => {
    expect(read('a,b\nc,d\n').notes[0]?.where).toBe('The whole file');
  });

  test('blanks are no faults: they are simply missing', () => {
    expect(details(swapped('3 intake', '3 intake,,'))).toEqual([]);
  });
});

describe('files that are no sheets', () => {
  test.each([
    ['empty', '', 'damaged-file'],
    ['markup', '<html><body>3 intake</body></html>', 'unsupported-file'],
    ['binary', '\u0000\u0001\u0002PK', 'unsupported-file'],
    ['an open quotation mark', `Position,"Lifter\n${'x'.repeat(300_000)}`, 'damaged-file'],
    ['too many rows', '3 intake,0.84\n'.repeat(2_500), 'damaged-file'],
    ['too many columns', `${'a,'.repeat(300)}\n`, 'damaged-file'],
  ])('%s is refused', (_name, text, name) => {
    const result = readCsv(new TextEncoder().encode(text));
    expect(result.ok ? '' : result.failure.name).toBe(name);
  });
});
