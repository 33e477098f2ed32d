import type { TextRows } from '../sheet-grid';

const isBlank = (cell: string): boolean => cell.trim() === '';

/** A title over several columns stands in the first of them. */
const filled = (row: readonly string[], width: number): readonly string[] => {
  let last = '';
  return Array.from({ length: width }, (_, at) => {
    last = (row[at] ?? '').trim() || last;
    return last;
  });
};

const isTitle = (row: readonly string[]): boolean =>
  row.filter((cell) => !isBlank(cell)).length > 1;

/** A row such as `Engine, VR-2231`, or a date: it says something of the sheet, not of a column. */
const saysNumbers = (row: readonly string[]): boolean => row.some((cell) => /\d{2}/.test(cell));

/**
 * The rows of headings among what stands above the first value row: the nearest row with more than one
 * cell, and titles right above it. Engine, date and remarks further up are none.
 */
const headingRows = (above: TextRows): TextRows => {
  let last = above.length - 1;
  while (last >= 0 && !isTitle(above[last] ?? [])) last -= 1;
  let first = last;
  while (first > 0) {
    const row = above[first - 1] ?? [];
    if (!isTitle(row) || saysNumbers(row)) break;
    first -= 1;
  }
  return last < 0 ? [] : above.slice(first, last + 1);
};

/** One heading a column, read downwards; only the last row's blanks stay blank. */
export const headings = (above: TextRows, width: number): readonly string[] => {
  const rows = headingRows(above);
  const parts = rows.map((row, at) => (at < rows.length - 1 ? filled(row, width) : row));
  return Array.from({ length: width }, (_, at) =>
    parts
      .map((row) => (row[at] ?? '').trim())
      .filter((part) => part !== '')
      .join(' ')
      .slice(0, 120),
  );
};
