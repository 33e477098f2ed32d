import { type Block, HEAD, TEXT } from './blocks';
import { type Align, type Pen, SHEET } from './pen';
import type { Style } from './typeface/typeface';

export interface Column {
  readonly head: string;
  /** Right end for `right`, left end otherwise, in pixels. */
  readonly at: number;
  readonly align?: Align;
}

export type Cell =
  | { readonly text: string; readonly style?: Style }
  | { readonly draw: (pen: Pen, x: number, top: number) => void };

const ROW = 23;

const drawCell = (pen: Pen, { at, align }: Column, cell: Cell, top: number): void => {
  if ('draw' in cell) cell.draw(pen, at, top);
  else pen.text(at, top + 16.5, cell.text, cell.style ?? TEXT, align);
};

/** Rows ruled in hair lines under a ruled head; the head stands again where a page is turned. */
export const table = (
  columns: readonly Column[],
  rows: readonly (readonly Cell[])[],
): readonly Block[] => {
  const head: Block = {
    height: ROW,
    draw: (pen, top) => {
      for (const column of columns) pen.text(column.at, top + 14, column.head, HEAD, column.align);
      pen.line(SHEET.content, top + ROW - 1, SHEET.right, top + ROW - 1, 1.5);
    },
  };
  return [
    head,
    ...rows.map((cells, place) => ({
      height: ROW,
      head,
      draw: (pen: Pen, top: number) => {
        if (place > 0) pen.line(SHEET.content, top - 1, SHEET.right, top - 1, 0.75);
        columns.forEach((column, i) => {
          const cell = cells[i];
          if (cell !== undefined) drawCell(pen, column, cell, top);
        });
      },
    })),
  ];
};
