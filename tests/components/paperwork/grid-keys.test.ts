import { describe, expect, it } from 'vitest';
import { keyStep, leavesCell } from '@/components/paperwork/sheet/grid/grid-keys';

const size = { rows: 16, columns: 3 };
const press = (key: string, row: number, column: number, ctrlKey = false) => {
  const to = keyStep({ row, column }, { key, ctrlKey }, size);
  return to && [to.row, to.column];
};

describe('keys in a grid of values', () => {
  it.each([
    ['ArrowDown', 0, 0, [1, 0]],
    ['ArrowUp', 5, 1, [4, 1]],
    ['ArrowRight', 5, 1, [5, 2]],
    ['ArrowLeft', 5, 1, [5, 0]],
    ['ArrowUp', 0, 1, [0, 1]],
    ['ArrowDown', 15, 1, [15, 1]],
    ['ArrowLeft', 3, 0, [3, 0]],
    ['ArrowRight', 3, 2, [3, 2]],
    ['Home', 7, 2, [7, 0]],
    ['End', 7, 0, [7, 2]],
    ['PageDown', 2, 1, [10, 1]],
    ['PageDown', 12, 1, [15, 1]],
    ['PageUp', 3, 1, [0, 1]],
  ] as const)('%s from row %i, column %i', (key, row, column, to) => {
    expect(press(key, row, column)).toEqual(to);
  });

  it('with the control key Home and End lead to the corners', () => {
    expect(press('Home', 7, 2, true)).toEqual([0, 0]);
    expect(press('End', 7, 0, true)).toEqual([15, 2]);
  });

  it('leaves other keys to the field', () => {
    expect([press('a', 1, 1), press('Tab', 1, 1), press('ArrowDown', 1, 1, true)]).toEqual([
      undefined,
      undefined,
      undefined,
    ]);
  });

  it('while a cell is edited only up, down and Enter lead out of it', () => {
    const keys = ['Enter', 'ArrowUp', 'ArrowDown', 'ArrowLeft', 'ArrowRight', 'Home', 'x'];
    expect(keys.filter(leavesCell)).toEqual(['Enter', 'ArrowUp', 'ArrowDown']);
  });
});
