import { describe, expect, test } from 'vitest';
import writeXlsxFile from 'write-excel-file/node';
import { judgeCells } from '@/domain/paperwork/sheet/judge-cells';
import { readBook } from '@/domain/paperwork/sheet/read-sheet';
import { sheetTemplate } from '@/domain/paperwork/sheet/template';
import { paperworkForm } from '@/domain/rulebook/form/paperwork-form';
import { ENGINE_RULE_SET } from '@/domain/rulebook/rule-sets/engine';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { GENERIC_LAYOUTS } from '@/domain/tappet/layout/generic-layouts';
import { readSheetRows } from '@/services/paperwork/sheet/read-sheet-rows';
import { templateCsv, templateXlsx } from '@/services/paperwork/sheet/template/write-template';

const about = {
  carNumber: '12',
  reference: '2231',
  className: 'Street Eight',
  paperworkId: '01900000-0000-7000-8000-000000000009',
};
const FILE = { fileId: 'f', name: 'lifters.xlsx' };
const forms = [...paperworkForm(TAPPET_RULE_SET).sheets, ...paperworkForm(ENGINE_RULE_SET).sheets]
  .filter((form) => form.columns.length > 0)
  .flatMap((form) => GENERIC_LAYOUTS.map((layout) => ({ form, layout })));

const gridOf = async (bytes: Uint8Array) => {
  const read = await readSheetRows(bytes);
  if (!read.ok) throw new Error(read.failure.detail);
  return read.value.grids;
};

/** The template as it was made, with a value in every empty cell, written by the same program. */
const filledIn = async (bytes: Uint8Array, value: (column: number) => string) => {
  const [grid] = await gridOf(bytes);
  const heading = grid!.rows.findIndex((row) => row.filter((cell) => cell !== '').length > 1);
  const width = grid!.rows[heading]!.length;
  const rows = grid!.rows.map((row, at) =>
    at <= heading
      ? [...row]
      : Array.from({ length: width }, (_, column) => (column === 0 ? row[0]! : value(column))),
  );
  const data = rows.map((row) => row.map((cell) => ({ value: cell, type: String })));
  return writeXlsxFile(data).toBuffer();
};

describe.each(['inch', 'metric'] as const)('a template in %s', (system) => {
  test.each(forms)('$form.title, $layout.name', async (wanted) => {
    const template = sheetTemplate(wanted, about, system);
    for (const bytes of [templateCsv(template), await templateXlsx(template)]) {
      const [grid] = await gridOf(bytes);
      expect(grid!.rows.flat().join(' ')).toContain('Car number: 12.');
      expect(grid!.rows.flat().join(' ')).toContain(about.paperworkId);
      const empty = readBook([grid!], wanted, FILE);
      expect([empty.cells, empty.notes]).toEqual([[], []]);
      // 21.4 mm and 0.843 in are sizes of a lifter; another quantity takes either.
      const typed = system === 'metric' ? '21.4' : '0.843';
      const grids = await gridOf(await filledIn(bytes, () => typed));
      const read = readBook(grids, wanted, FILE);
      expect(read.notes).toEqual([]);
      expect(read.cells).toHaveLength(template.places.length * wanted.form.columns.length);
      expect(judgeCells(read.cells).filter(({ state }) => state === 'faulty')).toEqual([]);
      expect(new Set(read.cells.map(({ quantity }) => quantity))).toEqual(
        new Set(wanted.form.columns.map(({ quantity }) => quantity)),
      );
      const unit = read.cells.find(({ quantity }) => quantity === 'lifter-body-diameter')?.unit;
      if (unit !== undefined) expect(unit).toBe(system === 'metric' ? 'mm' : 'in');
    }
  });
});

test('there are templates to try', () => {
  expect(forms.length).toBeGreaterThan(5);
});
