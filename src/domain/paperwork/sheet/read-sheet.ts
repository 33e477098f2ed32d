import { type ColumnMeaning, cellName, columnName, type SheetColumn } from './column-meaning';
import { hasDecimalCommas, withPoint } from './decimal-mark';
import { findColumns, type Mapping, type TextRows } from './find-columns';
import { findBore, findCylinder, findValve, rowsFor } from './positions';
import { placeKey, type SheetCell, type WantedSheet } from './sheet-cell';

/** A row or column that could not be used, by its place in the file, and what to do about it. */
export interface SheetNote {
  readonly where: string;
  readonly detail: string;
}

export interface ReadSheet {
  readonly columns: readonly SheetColumn[];
  readonly cells: readonly SheetCell[];
  readonly notes: readonly SheetNote[];
}

/** The file a sheet was read from. */
export interface SheetFile {
  readonly fileId: string;
  readonly name: string;
}

type Reading = Extract<ColumnMeaning, { kind: 'reading' }>;

interface Columns {
  readonly position?: SheetColumn | undefined;
  readonly cylinder?: SheetColumn | undefined;
  readonly valve?: SheetColumn | undefined;
  readonly readings: readonly (SheetColumn & { readonly meaning: Reading })[];
}

const isReading = (column: SheetColumn): column is SheetColumn & { readonly meaning: Reading } =>
  column.meaning.kind === 'reading';

const sorted = (columns: readonly SheetColumn[]): Columns => {
  const of = (kind: ColumnMeaning['kind']) =>
    columns.find((column) => column.meaning.kind === kind);
  return {
    position: of('position'),
    cylinder: of('cylinder'),
    valve: of('valve'),
    readings: columns.filter(isReading),
  };
};

/** The place that a row and a column mean: none where the row does not say, or says one that is not there. */
const positionAt = (
  row: readonly string[],
  columns: Columns,
  reading: Reading,
  wanted: WantedSheet,
): string | undefined => {
  const { form, layout } = wanted;
  const byBore = form.per === 'bore' || form.per === 'lifter';
  const text = (column: SheetColumn | undefined) => (column && row[column.at]) ?? '';
  const cylinder = findCylinder(text(columns.cylinder));
  if (!byBore) return rowsFor(form.per, layout).find((place) => place.key === cylinder)?.key;
  if (columns.position !== undefined) return findBore(text(columns.position), layout);
  const valve = reading.valve ?? findValve(text(columns.valve));
  return cylinder === undefined || valve === undefined
    ? undefined
    : findBore(`${cylinder} ${valve}`, layout);
};

const nameOf = (row: readonly string[], { position, cylinder, valve }: Columns): string =>
  [position, cylinder, valve]
    .flatMap((column) => (column === undefined ? [] : [(row[column.at] ?? '').trim()]))
    .filter((part) => part !== '')
    .join(' ');

const unplaced = (row: readonly string[], at: number, columns: Columns, per: string): SheetNote => {
  const name = nameOf(row, columns);
  const place = per === 'cylinder' ? 'cylinder' : 'bore';
  const example = per === 'cylinder' ? '“3”' : '“3 intake”';
  return {
    where: `Row ${at + 1}`,
    detail:
      name === ''
        ? `It does not say which ${place} it is for. Write it such as ${example}; its values were not taken.`
        : `“${name}” is no ${place} of this engine. Write it such as ${example}; its values were not taken.`,
  };
};

const hasValues = (row: readonly string[], columns: Columns): boolean =>
  columns.readings.some((column) => /\d/.test(row[column.at] ?? ''));

/**
 * From rows of text to the cells of a sheet: headings wherever they stand, in whatever order and words,
 * rows by bore (`3 intake`), by cylinder and valve, or by cylinder with the valve in the heading. What
 * is written stays as it is; nothing is dropped without a note.
 */
export const readSheet = (
  rows: TextRows,
  wanted: WantedSheet,
  file: SheetFile,
  mapping: Mapping = {},
): ReadSheet => {
  const found = findColumns(rows, wanted, mapping);
  if (found === undefined) {
    const example = wanted.form.per === 'cylinder' ? '“3”' : '“3 intake”';
    return {
      columns: [],
      cells: [],
      notes: [
        {
          where: 'The whole file',
          detail: `No row names a place on this engine, such as ${example}. Start from the template.`,
        },
      ],
    };
  }
  const columns = sorted(found.columns);
  const commas = hasDecimalCommas(rows);
  const cells = new Map<string, SheetCell>();
  const notes: SheetNote[] = [];
  for (const [at, row] of rows.entries()) {
    if (at < found.firstRow || !hasValues(row, columns)) continue;
    let placed = false;
    const twice = new Set<string>();
    for (const column of columns.readings) {
      const { quantity, unit, depth, axis } = column.meaning;
      const position = positionAt(row, columns, column.meaning, wanted);
      if (position === undefined) continue;
      placed = true;
      const written = (row[column.at] ?? '').trim();
      if (written === '') continue;
      const place = { position, quantity, depth, axis };
      const key = placeKey(place);
      if (cells.has(key)) {
        twice.add(position);
        continue;
      }
      const source = { fileId: file.fileId, file: file.name, cell: cellName(at, column.at) };
      cells.set(key, { ...place, typed: commas ? withPoint(written) : written, unit, source });
    }
    if (!placed) notes.push(unplaced(row, at, columns, wanted.form.per));
    for (const position of twice) {
      notes.push({
        where: `Row ${at + 1}`,
        detail: `${position} stands here a second time; the first row was taken, this one was not.`,
      });
    }
  }
  return {
    columns: found.columns,
    cells: [...cells.values()],
    notes: [...notes, ...unknownColumns(found.columns)],
  };
};

const unknownColumns = (columns: readonly SheetColumn[]): readonly SheetNote[] =>
  columns
    .filter(({ meaning, header }) => meaning.kind === 'not-taken' && header !== '')
    .map(({ at, header }) => ({
      where: `Column ${columnName(at)}`,
      detail: `“${header}” was not taken. Say below what it holds if it should be.`,
    }));
