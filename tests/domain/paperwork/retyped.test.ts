import { describe, expect, test } from 'vitest';
import { paperworkDraft } from '@/contracts/paperwork/draft';
import { EMPTY_DRAFT } from '@/domain/paperwork/draft';
import { retyped, type SheetCell, sourceWords } from '@/domain/paperwork/sheet/sheet-cell';

const cell: SheetCell = {
  position: '3 intake',
  quantity: 'tappet-bore-diameter',
  depth: '',
  axis: '',
  typed: '0.84.41',
  unit: 'in',
  confirmed: true,
  source: { fileId: '01900000-0000-7000-8000-000000000001', file: 'lifters.xlsx', cell: 'Old!D7' },
};

describe('a cell that is typed anew', () => {
  test('still says where it came from and what stood there, and nobody stands by it yet', () => {
    const once = retyped(cell, '0.8441');
    expect(once.confirmed).toBeUndefined();
    expect(once.source).toEqual({ ...cell.source, held: '0.84.41' });
    expect(retyped(once, '0.8442').source?.held).toBe('0.84.41');
  });

  test('typed back it is as the file has it', () => {
    expect(retyped(retyped(cell, '0.8441'), '0.84.41').source).toEqual(cell.source);
  });

  test('its place is said as row and column, with the sheet where there are several', () => {
    expect(sourceWords(cell.source!)).toBe('row 7, column D of “Old” in lifters.xlsx');
    expect(sourceWords({ ...cell.source!, cell: 'AB12' })).toBe(
      'row 12, column AB of lifters.xlsx',
    );
  });
});

describe('a draft that comes in', () => {
  const issues = (unit: string, quantity: string = cell.quantity) => {
    const sheets = [{ subject: 'lifter-sheet', cells: [{ ...cell, unit, quantity }] }];
    return paperworkDraft
      .safeParse({ ...EMPTY_DRAFT, sheets })
      .error?.issues.map(({ path }) => path);
  };

  test('with what a file held is taken; a unit that measures something else is not', () => {
    expect(issues('in')).toBeUndefined();
    expect(issues('g')).toEqual([['sheets', 0, 'cells', 0, 'unit']]);
    expect(issues('constructor')).toEqual([['sheets', 0, 'cells', 0, 'unit']]);
    expect(issues('in', 'shoe-size')).toEqual([['sheets', 0, 'cells', 0, 'quantity']]);
  });
});
