import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, test } from 'vitest';
import { isUnexplained } from '@/domain/paperwork/sheet/header/column-meaning';
import type { Mapping } from '@/domain/paperwork/sheet/header/find-columns';
import { judgeCells } from '@/domain/paperwork/sheet/judge-cells';
import { readBook } from '@/domain/paperwork/sheet/read-sheet';
import { parseQuantity } from '@/domain/quantity/parse';
import { compare } from '@/domain/quantity/rational';
import { paperworkForm } from '@/domain/rulebook/form/paperwork-form';
import { getQuantityEntry, isQuantityName } from '@/domain/rulebook/quantity-catalogue';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { GENERIC_LAYOUTS } from '@/domain/tappet/layout/generic-layouts';
import { readSheetRows } from '@/services/paperwork/sheet/read-sheet-rows';

/** Files that LibreOffice made; `npm run test:office` has it make them anew and names their folder. */
const folder =
  process.env['TEST_OFFICE'] ?? fileURLToPath(new URL('../../fixtures/office', import.meta.url));

interface Expected {
  readonly what: string;
  readonly columns: Readonly<Record<string, { readonly quantity: string; readonly unit: string }>>;
  readonly notes: readonly string[];
  readonly cells: readonly {
    readonly cell: string;
    readonly position: string;
    readonly quantity: string;
    readonly value?: string;
    readonly detail?: string;
  }[];
}

// What is expected is the committed word; only the files may be made anew.
const expected: Readonly<Record<string, Expected>> = JSON.parse(
  readFileSync(
    fileURLToPath(new URL('../../fixtures/office/expected.json', import.meta.url)),
    'utf8',
  ),
);

const form = paperworkForm(TAPPET_RULE_SET).sheets.find((sheet) => sheet.sheet === 'lifters')!;
const wanted = { form, layout: GENERIC_LAYOUTS[0]! };

const mappingOf = (columns: Expected['columns']): Mapping =>
  Object.fromEntries(
    Object.entries(columns).map(([key, { quantity, unit }]) => [
      key,
      isQuantityName(quantity)
        ? { kind: 'reading', quantity, unit, depth: '', axis: '' }
        : { kind: 'not-taken' },
    ]),
  );

const exact = (quantity: string, text: string) => {
  if (!isQuantityName(quantity)) throw new Error(quantity);
  const read = parseQuantity(text, { dimension: getQuantityEntry(quantity).dimension });
  if (!read.ok) throw new Error(read.failure.detail);
  return read.value.value;
};

describe('sheets that LibreOffice made', () => {
  test.each(Object.entries(expected))('%s', async (name, { columns, notes, cells }) => {
    const rows = await readSheetRows(readFileSync(join(folder, name)));
    if (!rows.ok) throw new Error(rows.failure.detail);
    const read = (mapping: Mapping) =>
      readBook(rows.value.grids, wanted, { fileId: 'f', name }, mapping);

    const first = read({});
    expect(first.columns.filter(isUnexplained).map(({ key }) => key)).toEqual(
      expect.arrayContaining(Object.keys(columns)),
    );
    const sheet = read(mappingOf(columns));
    const judged = judgeCells(sheet.cells);
    const found = judged.map(({ cell, state }) => ({
      cell: cell.source?.cell,
      position: cell.position,
      quantity: cell.quantity,
      good: state === 'ok',
    }));
    const byPlace = (a: { position: string; quantity: string }, b: typeof a) =>
      `${a.position} ${a.quantity}`.localeCompare(`${b.position} ${b.quantity}`);
    expect(found.toSorted(byPlace)).toEqual(
      cells
        .map(({ cell, position, quantity, value }) => ({
          cell,
          position,
          quantity,
          good: value !== undefined,
        }))
        .toSorted(byPlace),
    );
    for (const one of cells) {
      const own = judged.find(({ cell }) => cell.source?.cell === one.cell)!;
      if (one.value === undefined) expect(own.detail).toContain(one.detail);
      else {
        const value = exact(one.quantity, one.value);
        expect([one.cell, compare(own.quantity!.value, value)]).toEqual([one.cell, 0]);
      }
    }
    expect(sheet.notes.map(({ where }) => where)).toEqual(notes);
  });

  test('every file is expected, and there are shapes enough', () => {
    const files = readdirSync(folder).filter((file) => /\.(csv|xlsx)$/.test(file));
    expect(files.sort()).toEqual(Object.keys(expected).sort());
    expect(files.filter((file) => file.endsWith('.xlsx')).length).toBeGreaterThanOrEqual(8);
    expect(files.filter((file) => file.endsWith('.csv')).length).toBeGreaterThanOrEqual(8);
  });

  test('the German ones have decimal commas, semicolons and letters of the code page', () => {
    const text = readFileSync(join(folder, 'german.csv')).toString('latin1');
    expect(text).toContain('St\u00f6\u00dfel');
    expect(text).toContain(';21,392;');
  });

  test('a number keeps the zeros that its format shows', async () => {
    const rows = await readSheetRows(readFileSync(join(folder, 'across.xlsx')));
    const cells = rows.ok ? rows.value.grids.flatMap((grid) => grid.rows.flat()) : [];
    expect(cells).toContain('0.8440');
  });
});
