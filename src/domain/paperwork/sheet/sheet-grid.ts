export type TextRows = readonly (readonly string[])[];

/** One sheet of a file as rows of text. Rows and columns count from 0. */
export interface SheetGrid {
  /** As the workbook calls it; empty for a file of one sheet only. */
  readonly name: string;
  readonly hidden: boolean;
  readonly rows: TextRows;
  readonly hiddenRows: readonly number[];
  readonly hiddenColumns: readonly number[];
  /** Cells with a formula whose result was not saved, by row and column. */
  readonly unsaved: readonly (readonly [number, number])[];
}

export const plainGrid = (rows: TextRows): SheetGrid => ({
  name: '',
  hidden: false,
  rows,
  hiddenRows: [],
  hiddenColumns: [],
  unsaved: [],
});

/** Rows for columns: for sheets that run from left to right. */
export const turned = (grid: SheetGrid): SheetGrid => {
  const width = grid.rows.reduce((most, row) => Math.max(most, row.length), 0);
  return {
    ...grid,
    rows: Array.from({ length: width }, (_, at) => grid.rows.map((row) => row[at] ?? '')),
    hiddenRows: grid.hiddenColumns,
    hiddenColumns: grid.hiddenRows,
    unsaved: grid.unsaved.map(([row, column]) => [column, row] as const),
  };
};
