import { findDegree } from '../../cam/cam-place';
import { degreeMeaning, isDegreeRow } from '../../cam/read-cam-table';
import { findBore, findCylinder, findValve } from '../positions';
import type { WantedSheet } from '../sheet-cell';
import type { TextRows } from '../sheet-grid';
import { type ColumnMeaning, columnName, type SheetColumn } from './column-meaning';
import { headings } from './headings';
import { isOwnColumn, readHeader } from './read-header';

export interface FoundColumns {
  readonly columns: readonly SheetColumn[];
  /** The first row that holds values, from 0. */
  readonly firstRow: number;
}

/** Meanings that the person chose, by the column's key; they go before what the heading seems to say. */
export type Mapping = Readonly<Record<string, ColumnMeaning>>;

const LOOKED_AT = 40;
const SAMPLES = 3;

const isByBore = ({ form }: WantedSheet): boolean => form.per === 'bore' || form.per === 'lifter';

const isValueRow = (row: readonly string[], wanted: WantedSheet): boolean => {
  if (wanted.form.per === 'degree') return isDegreeRow(row);
  const says = (test: (text: string) => unknown) => row.some((cell) => test(cell) !== undefined);
  const hasNumber = row.filter((cell) => /\d/.test(cell)).length > 1;
  return (
    (isByBore(wanted) && says((cell) => findBore(cell, wanted.layout))) ||
    (hasNumber && says(findCylinder))
  );
};

/** Where nothing is filled in yet, a cylinder's number stands alone below the headings. */
const firstValueRow = (rows: TextRows, wanted: WantedSheet): number => {
  const filled = rows.findIndex((row) => isValueRow(row, wanted));
  if (filled >= 0) return filled;
  const heading = rows.findIndex((row) => row.filter((cell) => cell.trim() !== '').length > 1);
  const names = wanted.form.per === 'degree' ? findDegree : findCylinder;
  return heading < 0
    ? -1
    : rows.findIndex((row, at) => at > heading && names(row[0] ?? '') !== undefined);
};

const share = (cells: readonly string[], test: (text: string) => unknown): number =>
  cells.length === 0 ? 0 : cells.filter((cell) => test(cell) !== undefined).length / cells.length;

const meaningOf = (
  header: string,
  cells: readonly string[],
  wanted: WantedSheet,
): ColumnMeaning => {
  if (isOwnColumn(header)) return { kind: 'not-taken' };
  if (wanted.form.per === 'degree')
    return degreeMeaning(header, share(cells, findDegree) > 0.5, wanted.form);
  const byBore = isByBore(wanted);
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

/** A choice that does not fit this sheet is none: it may come from one the rules have changed since. */
const chosenFor = (
  mapping: Mapping,
  key: string,
  { form }: WantedSheet,
): ColumnMeaning | undefined => {
  const chosen = Object.hasOwn(mapping, key) ? mapping[key] : undefined;
  const known =
    chosen?.kind !== 'reading' ||
    (form.columns.some(({ quantity }) => quantity === chosen.quantity) &&
      (form.per !== 'degree' || chosen.valve !== undefined));
  return known ? chosen : undefined;
};

interface Asked {
  readonly mapping?: Mapping | undefined;
  readonly hiddenColumns?: readonly number[] | undefined;
}

/** Finds the headings among title rows and says what each column holds; nothing where no value row is found. */
export const findColumns = (
  rows: TextRows,
  wanted: WantedSheet,
  { mapping = {}, hiddenColumns = [] }: Asked = {},
): FoundColumns | undefined => {
  const firstRow = firstValueRow(rows.slice(0, LOOKED_AT), wanted);
  if (firstRow < 0) return undefined;
  const width = rows.reduce((most, row) => Math.max(most, row.length), 0);
  const titles = headings(rows.slice(0, firstRow), width);
  const columns = titles.map((header, at): SheetColumn => {
    const cells = rows
      .slice(firstRow)
      .map((row) => (row[at] ?? '').trim())
      .filter((cell) => cell !== '');
    const hidden = hiddenColumns.includes(at);
    const key = header || `column ${columnName(at)}`;
    const chosen = chosenFor(mapping, key, wanted);
    const said = chosen ?? meaningOf(header, cells, wanted);
    // What does not show in the spreadsheet is not declared by it, unless somebody says so.
    const unseen = hidden && chosen === undefined && said.kind === 'reading';
    return {
      at,
      header,
      key,
      meaning: unseen ? { kind: 'not-taken' } : said,
      chosen: chosen !== undefined || isOwnColumn(header),
      hidden,
      samples: cells.slice(0, SAMPLES).map((cell) => cell.slice(0, 60)),
    };
  });
  return { columns: numbered(columns), firstRow };
};
