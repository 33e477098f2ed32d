import { describe, expect, test } from 'vitest';
import { judgeCells } from '@/domain/paperwork/sheet/judge-cells';
import { readBook } from '@/domain/paperwork/sheet/read-sheet';
import { paperworkForm } from '@/domain/rulebook/form/paperwork-form';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { GENERIC_LAYOUTS } from '@/domain/tappet/layout/generic-layouts';
import { readSheetRows } from '@/services/paperwork/sheet/read-sheet-rows';
import { type XlsxCell, xlsxOf, zipOf } from '../../support/xlsx';

const form = paperworkForm(TAPPET_RULE_SET).sheets.find((sheet) => sheet.sheet === 'lifters')!;
const wanted = { form, layout: GENERIC_LAYOUTS[0]! };

const read = async (rows: readonly (readonly XlsxCell[])[]) => {
  const found = await readSheetRows(xlsxOf(rows));
  if (!found.ok) throw new Error(found.failure.detail);
  return readBook(found.value.grids, wanted, { fileId: 'f', name: 'lifters.xlsx' });
};

describe('an XLSX sheet', () => {
  test('numbers as spreadsheets store them come back as they were meant, and name their cell', async () => {
    const sheet = await read([
      ['Engine VR-2231', null, null],
      ['Position', 'Lifter (in)', 'Bore (in)'],
      ['3 intake', { number: '0.84230000000000005' }, { number: '0.84399999999999997' }],
      [
        '3 exhaust',
        { number: '0.84219999999999995' },
        { formula: 'B4+0.0018', result: '0.84399999999999997' },
      ],
    ]);
    expect(
      sheet.cells.map(({ position, typed, source }) => [position, typed, source?.cell]),
    ).toEqual([
      ['3 intake', '0.8423', 'B3'],
      ['3 intake', '0.844', 'C3'],
      ['3 exhaust', '0.8422', 'B4'],
      ['3 exhaust', '0.844', 'C4'],
    ]);
    expect(judgeCells(sheet.cells).every((cell) => cell.state === 'ok')).toBe(true);
  });

  test('blank rows keep the rows below in their place, and text stays text', async () => {
    const sheet = await read([['Pos', 'Lifter', 'Bore'], [], ['1 intake', '0.8423', 'worn']]);
    expect(sheet.cells.map(({ typed, source }) => [typed, source?.cell])).toEqual([
      ['0.8423', 'B3'],
      ['worn', 'C3'],
    ]);
  });

  test('a packed file that is no workbook, and a workbook without its parts, are refused with words', async () => {
    const other = await readSheetRows(zipOf({ 'a.txt': 'a' }));
    expect(other.ok ? '' : other.failure.detail).toContain('no XLSX sheet');
    const torn = await readSheetRows(zipOf({ 'xl/workbook.xml': '<workbook/>' }));
    expect(torn.ok ? '' : torn.failure.detail).toContain('is damaged');
  });
});
