import { describe, expect, test } from 'vitest';
import { correctionsOf, neutral } from '@/domain/paperwork/sheet/corrections';
import { isOwnColumn } from '@/domain/paperwork/sheet/header/read-header';
import { judgeCells } from '@/domain/paperwork/sheet/judge-cells';
import { readBook } from '@/domain/paperwork/sheet/read-sheet';
import { paperworkForm } from '@/domain/rulebook/form/paperwork-form';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { GENERIC_LAYOUTS } from '@/domain/tappet/layout/generic-layouts';
import { annotateCsv } from '@/services/paperwork/sheet/annotate/annotate-csv';
import { annotateXlsx } from '@/services/paperwork/sheet/annotate/annotate-xlsx';
import { readCsv } from '@/services/paperwork/sheet/csv/read-csv';
import { readSheetRows, XLSX } from '@/services/paperwork/sheet/read-sheet-rows';
import { nothingSpent } from '@/services/paperwork/sheet/spent';
import { openPackage } from '@/services/paperwork/sheet/xlsx/open-package';
import { xlsxOf } from '../../support/xlsx';

const form = paperworkForm(TAPPET_RULE_SET).sheets.find((sheet) => sheet.sheet === 'lifters')!;
const wanted = { form, layout: GENERIC_LAYOUTS[0]! };

const understood = async (bytes: Uint8Array) => {
  const found = await readSheetRows(bytes);
  if (!found.ok) throw new Error(found.failure.detail);
  const read = readBook(found.value.grids, wanted, { fileId: 'f', name: 'lifters' });
  return { type: found.value.type, grids: found.value.grids, read };
};

const givenBack = async (bytes: Uint8Array): Promise<Uint8Array> => {
  const { type, read } = await understood(bytes);
  const what = {
    corrections: correctionsOf(read, judgeCells(read.cells)),
    headingRow: read.headingRow,
    ownColumn: read.columns.find(({ header }) => isOwnColumn(header))?.at,
  };
  const made = type === XLSX ? annotateXlsx(bytes, read.sheet, what) : annotateCsv(bytes, what);
  if (!made.ok) throw new Error(made.failure.detail);
  return made.value;
};

const CSV = [
  'Engine VR-2231;;;',
  'Position;Lifter;Bore;Notes',
  '3 intake;0,8422;0.84.41;"re-honed; ""B"" ring"',
  '3 exhaust;0,8423;0,8440;=HYPERLINK("http://x")',
  '9 intake;0,8423;0,8440;-0,0012',
  '',
].join('\r\n');
const BAD =
  'C3: 3 intake, bore: “0.84.41” is no number. Write one number with one decimal mark, such as 0.8441.';

describe('a CSV file given back', () => {
  test.each([
    ['UTF-8', Buffer.from(CSV)],
    ['UTF-8 with its mark', Buffer.from(`\uFEFF${CSV}`)],
    ['UTF-16', Buffer.from(`\uFEFF${CSV}`, 'utf16le')],
    ['UTF-16, the other way round', Buffer.from(`\uFEFF${CSV}`, 'utf16le').swap16()],
    ['“sep=” first', Buffer.from(`sep=;\r\n${CSV}`)],
  ])('%s: same form, its own cells, and the words in one more column', async (_name, bytes) => {
    const before = readCsv(bytes);
    const after = readCsv(await givenBack(bytes));
    if (!before.ok || !after.ok) throw new Error('not read');
    expect(after.value.form).toEqual(before.value.form);
    expect(after.value.rows).toEqual([
      ['Engine VR-2231', '', '', ''],
      ['Position', 'Lifter', 'Bore', 'Notes', 'To correct (added by Tagwire)'],
      ['3 intake', '0,8422', '0.84.41', 're-honed; "B" ring', BAD],
      ['3 exhaust', '0,8423', '0,8440', `'=HYPERLINK("http://x")`],
      [
        '9 intake',
        '0,8423',
        '0,8440',
        '-0,0012',
        'Row 5: “9 intake” is no bore of this engine. Write it such as “3 intake”; its values were not taken.',
      ],
    ]);
  });

  test('in the code page of the West: its own letters, and no letter that it lacks', async () => {
    const bytes = Buffer.from(
      CSV.replace('re-honed', 'gehont für “A”').replace(/“A”/, 'A'),
      'latin1',
    );
    const back = Buffer.from(await givenBack(bytes));
    expect(back.includes(Buffer.from('f\u00fcr', 'latin1'))).toBe(true);
    expect(back.includes(Buffer.from([0x93, ...Buffer.from('0.84.41'), 0x94]))).toBe(true);
  });

  test('given back twice, corrected in between: the column is written anew and never read', async () => {
    const once = await givenBack(Buffer.from(CSV));
    const fixed = Buffer.from(once).toString().replace(';0.84.41;', ';0,8441;');
    const { read } = await understood(Buffer.from(fixed));
    expect(read.columns.filter(({ header }) => isOwnColumn(header))).toHaveLength(1);
    expect(read.notes.map(({ where }) => where)).toEqual(['Row 5', 'Column D']);
    const twice = Buffer.from(await givenBack(Buffer.from(fixed))).toString();
    expect(twice.match(/To correct/g)).toHaveLength(1);
    expect(twice).not.toContain('0.84.41');
  });
});

test.each([
  ['=1+1', "'=1+1"],
  ['+49 30 1', "'+49 30 1"],
  ['@sum(A1)', "'@sum(A1)"],
  ['-cmd', "'-cmd"],
  ['\t=1', "'\t=1"],
  ['-0.0012', '-0.0012'],
  ['+0,8440 in', '+0,8440 in'],
  ['3 intake', '3 intake'],
  ['', ''],
])('%s is written as %s', (cell, written) => {
  expect(neutral(cell)).toBe(written);
});

describe('a workbook given back', () => {
  const book = xlsxOf([
    ['Engine VR-2231'],
    ['Position', 'Lifter (in)', 'Bore (in)'],
    ['3 intake', { number: '0.8422' }, '0.84.41'],
    ['3 exhaust', { number: '0.8422' }, { formula: 'B4+0.0018', result: '0.844' }],
    ['', '', '', 'a <remark> & more'],
  ]);

  test('keeps its own cells and formulas, and says what to correct beside each row', async () => {
    const back = await givenBack(book);
    const { grids, read } = await understood(back);
    expect(grids[0]!.rows.map((row) => row.slice(0, 3))).toEqual([
      ['Engine VR-2231', '', ''],
      ['Position', 'Lifter (in)', 'Bore (in)'],
      ['3 intake', '0.8422', '0.84.41'],
      ['3 exhaust', '0.8422', '0.844'],
      ['', '', ''],
    ]);
    expect(grids[0]!.rows.map((row) => row[4] ?? '')).toEqual([
      '',
      'To correct (added by Tagwire)',
      BAD,
      '',
      '',
    ]);
    expect(read.notes).toEqual([]);
    const file = openPackage(back, nothingSpent());
    const xml = file.ok ? file.value.read('xl/worksheets/sheet1.xml') : file;
    expect(xml.ok && xml.value).toContain('<f>B4+0.0018</f>');
    // Our words are text of their own kind: nothing that a program works out.
    expect(xml.ok && xml.value.match(/<f>/g)).toHaveLength(1);
  });

  test('given back twice it has one such column', async () => {
    const twice = await givenBack(await givenBack(book));
    const { grids } = await understood(twice);
    expect(grids[0]!.rows[1]).toEqual([
      'Position',
      'Lifter (in)',
      'Bore (in)',
      '',
      'To correct (added by Tagwire)',
    ]);
  });
});
