import { renderToStaticMarkup } from 'react-dom/server';
import { describe, expect, it } from 'vitest';
import { ValuesGrid } from '@/components/paperwork/sheet/grid/ValuesGrid';
import { ColumnsHeld } from '@/components/paperwork/sheet/import/ColumnsHeld';
import { ImportPreview } from '@/components/paperwork/sheet/import/ImportPreview';
import {
  meaningFor,
  meaningOptions,
  optionOf,
  spotOf,
  withSpot,
  withUnit,
} from '@/components/paperwork/sheet/import/meanings';
import type { ColumnMeaning } from '@/domain/paperwork/sheet/header/column-meaning';
import { judgeCells } from '@/domain/paperwork/sheet/judge-cells';
import { readSheet } from '@/domain/paperwork/sheet/read-sheet';
import { paperworkForm } from '@/domain/rulebook/form/paperwork-form';
import { TAPPET_RULE_SET } from '@/domain/rulebook/rule-sets/tappet';
import { GENERIC_LAYOUTS } from '@/domain/tappet/layout/generic-layouts';

const form = paperworkForm(TAPPET_RULE_SET).sheets.find((sheet) => sheet.sheet === 'lifters')!;
const layout = GENERIC_LAYOUTS[0]!;
const nothing = () => undefined;

const sheet = readSheet(
  [
    ['Position', 'Lifter', 'OD 2', 'Bore'],
    ['3 intake', '0.8422', '1', '0.84.41'],
    ['3 exhaust', '0.8423', '2', '0.8440'],
    ['9 intake', '0.8423', '3', '0.8440'],
  ],
  { form, layout },
  { fileId: '01900000-0000-7000-8000-000000000001', name: 'lifters.csv' },
);

const columns = sheet.columns.map((column) => ({ ...column, samples: [...column.samples] }));

describe('what a column can hold', () => {
  it('every choice says again what it was chosen as', () => {
    for (const { value } of meaningOptions(form)) {
      expect(optionOf(meaningFor(value, form))).toBe(value);
    }
  });

  it('a reading takes the unit of the rules; unit and place change without its number of repeat', () => {
    const reading = meaningFor('reading tappet-bore-diameter', form);
    expect(reading).toMatchObject({ kind: 'reading', unit: 'in', depth: '', axis: '' });
    const repeat = { ...reading, depth: 'above', axis: 'along 2' } as Extract<
      ColumnMeaning,
      { kind: 'reading' }
    >;
    expect(spotOf(repeat)).toBe('above along');
    expect(withUnit(repeat, 'mm')).toMatchObject({ unit: 'mm', depth: 'above', axis: 'along' });
    expect(withSpot(repeat, 'below across')).toMatchObject({ depth: 'below', axis: 'across' });
    expect(withSpot(repeat, '')).toMatchObject({ depth: '', axis: '' });
  });
});

describe('a file before it counts', () => {
  it('shows each column with its first values and what it holds; the unknown one is asked', () => {
    const html = renderToStaticMarkup(
      <ColumnsHeld sheet={{ columns, turned: false }} form={form} onChoose={nothing} />,
    );
    expect(html).toContain('1 to say');
    expect(html).toContain('<details class="my-3" open="">');
    expect(html).toContain('1 · 2 · 3');
    expect(html).toContain('aria-label="OD 2 holds"');
    expect(html).toContain('aria-label="Unit of Bore"');
    expect(html).not.toContain('aria-label="Unit of OD 2"');
  });

  it('names the bad cell by row, column, value and remedy, and gives the file back with them', () => {
    const html = renderToStaticMarkup(
      <ImportPreview
        file={{
          fileId: 'f1',
          purpose: 'sheet',
          item: form.subject,
          name: 'lifters.csv',
          state: 'kept',
          refusedBecause: null,
          keptAt: null,
          sha256: '',
          bytes: '1',
          type: 'text/csv',
        }}
        sheet={{ ...sheet, columns: [], cells: [], notes: [...sheet.notes] }}
        cells={sheet.cells}
        held={sheet.cells.map((cell) => ({ ...cell, typed: '0.8400' }))}
        form={form}
        layout={layout}
        onChange={nothing}
        onConfirm={nothing}
      />,
    );
    const text = html.replace(/<[^>]+>/g, '').replace(/\s+/g, ' ');
    expect(text).toContain('3 intake, bore: “0.84.41” is no number. Kept as written.');
    expect(text).toContain('Write one number with one decimal mark, such as 0.8441.');
    expect(text).toContain('In row 2, column D of lifters.csv (cell D2).');
    expect(text).toContain('Confirm these 4 values');
    expect(text).toContain('3 count once you confirm; 1 cell stays to be corrected');
    expect(text).toContain('4 values in the form will be replaced');
    expect(html).toContain('/api/sheets/f1/corrections');
  });
});

describe('the grid', () => {
  const html = renderToStaticMarkup(
    <ValuesGrid
      form={form}
      layout={layout}
      judged={judgeCells(sheet.cells)}
      label="Lifters"
      onChange={nothing}
    />,
  );

  it('is one stop for the tabulator, with a name for every cell and the faulty one marked', () => {
    expect(html).toContain('role="grid"');
    expect(html.match(/tabindex="0"/g)).toHaveLength(1);
    expect(html.match(/tabindex="-1"/g)).toHaveLength(16 * 3 - 1);
    const faulty = /<input[^>]*aria-invalid="true"[^>]*>/.exec(html)?.[0];
    expect(faulty).toContain('aria-label="3 intake, Tappet bore diameter"');
    expect(faulty).toContain('value="0.84.41"');
  });
});
