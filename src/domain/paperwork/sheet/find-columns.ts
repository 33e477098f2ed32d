import type { ColumnMeaning, SheetColumn } from './column-meaning';
import { findBore, findCylinder, findValve } from './positions';
import { readHeader } from './read-header';
import type { WantedSheet } from './sheet-cell';

export type TextRows = readonly (readonly string[])[];

export interface FoundColumns {
  readonly columns: readonly SheetColumn[];
  /** The first row that holds values, from 0. */
  readonly firstRow: number;
}

/** Meanings that the person chose, by heading; they go before what the heading seems to say. */
export type Mapping = Readonly<Record<string, ColumnMeaning>>;

const LOOKED_AT = 40;

const isValueRow = (row: readonly string[], wanted: WantedSheet): boolean => {
  const { per } = wanted.form;
  const says = (test: (text: string) => unknown) => row.some((cell) => test(cell) !== undefined);
  const hasNumber = row.filter((cell) => /\d/.test(cell)).length > 1;
  if (per === 'bore' || per === 'lifter')
    return says((cell) => findBore(cell, wanted.layout)) || (hasNumber && says(findCylinder));
  return hasNumber && says(findCylinder);
};

/** A title over several columns stands in the first of them. */
const filled = (row: readonly string[], width: number): readonly string[] => {
  let last = '';
  return Array.from({ length: width }, (_, at) => {
    last = (row[at] ?? '').trim() || last;
    return last;
  });
};

/** Headings of several rows read downwards; only the last row's blanks stay blank. */
const headings = (rows: TextRows, width: number): readonly string[] => {
  const used = rows.filter((row) => row.filter((cell) => cell.trim() !== '').length > 1);
  const parts = used.map((row, at) => (at < used.length - 1 ? filled(row, width) : row));
  return Array.from({ length: width }, (_, at) =>
    parts
      .map((row) => (row[at] ?? '').trim())
      .filter((part) => part !== '')
      .join(' '),
  );
};

const share = (cells: readonly string[], test: (text: string) => unknown): number => {
  const written = cells.filter((cell) => cell.trim() !== '');
  return written.length === 0
    ? 0
    : written.filter((cell) => test(cell) !== undefined).length / written.length;
};

const meaningOf = (
  header: string,
  cells: readonly string[],
  wanted: WantedSheet,
): ColumnMeaning => {
  const byBore = wanted.form.per === 'bore' || wanted.form.per === 'lifter';
  if (byBore && share(cells, (cell) => findBore(cell, wanted.layout)) > 0.5)
    return { kind: 'position' };
  if (byBore && share(cells, findValve) > 0.5) return { kind: 'valve' };
  if (/\b(cyl|cylinder|zyl)/i.test(header) && share(cells, findCylinder) > 0.5)
    return { kind: 'cylinder' };
  if (/^(no|nr|#|pos|position)?\.?$/i.test(header.trim()) && share(cells, findCylinder) > 0.5)
    return { kind: 'cylinder' };
  return readHeader(header, wanted.form);
};

/** Two columns that mean the same are repeats: told apart by their number. */
const numbered = (columns: readonly SheetColumn[]): readonly SheetColumn[] => {
  const key = ({ meaning }: SheetColumn) =>
    meaning.kind === 'reading'
      ? [meaning.quantity, meaning.depth, meaning.axis, meaning.valve ?? ''].join('|')
      : '';
  return columns.map((column, at) => {
    const alike = columns.filter((other) => key(other) === key(column) && key(column) !== '');
    if (column.meaning.kind !== 'reading' || alike.length < 2) return column;
    const nth = columns.slice(0, at + 1).filter((other) => alike.includes(other)).length;
    const axis = [column.meaning.axis, String(nth)].filter((part) => part !== '').join(' ');
    return { ...column, meaning: { ...column.meaning, axis } };
  });
};

/** Finds the headings among title rows and says what each column holds; nothing where no value row is found. */
export const findColumns = (
  rows: TextRows,
  wanted: WantedSheet,
  mapping: Mapping = {},
): FoundColumns | undefined => {
  const firstRow = rows.slice(0, LOOKED_AT).findIndex((row) => isValueRow(row, wanted));
  if (firstRow < 0) return undefined;
  const width = Math.max(...rows.map((row) => row.length));
  const titles = headings(rows.slice(0, firstRow), width);
  const columns = titles.map((header, at): SheetColumn => {
    const cells = rows.slice(firstRow).map((row) => row[at] ?? '');
    return { at, header, meaning: mapping[header] ?? meaningOf(header, cells, wanted) };
  });
  return { columns: numbered(columns), firstRow };
};
