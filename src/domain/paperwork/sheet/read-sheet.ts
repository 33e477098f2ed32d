import { hasDecimalCommas, withPoint } from './decimal-mark';
import {
  type ColumnMeaning,
  cellName,
  isUnexplained,
  type SheetColumn,
} from './header/column-meaning';
import { findColumns, type Mapping } from './header/find-columns';
import { nameIn, placeAt, type SheetPlaces } from './place-at';
import { placeKey, type SheetCell, type WantedSheet } from './sheet-cell';
import type { TextRows } from './sheet-grid';
import { plainGrid, type SheetGrid, turned } from './sheet-grid';
import { type SheetNote, unplaced, withoutPlaces } from './sheet-note';

export interface ReadSheet {
  readonly columns: readonly SheetColumn[];
  readonly cells: readonly SheetCell[];
  readonly notes: readonly SheetNote[];
  /** The row of the headings in the file, from 0; 0 where there is none. */
  readonly headingRow: number;
  /** Runs from left to right: what is called a column here is a row of the file. */
  readonly turned: boolean;
  /** As the workbook calls it; empty where the file has one sheet. */
  readonly sheet: string;
}

/** The file a sheet was read from. */
export interface SheetFile {
  readonly fileId: string;
  readonly name: string;
}

type Reading = Extract<ColumnMeaning, { kind: 'reading' }>;
type ReadingColumn = SheetColumn & { readonly meaning: Reading };

const isReading = (column: SheetColumn): column is ReadingColumn =>
  column.meaning.kind === 'reading';

/** Of a cam table the lobe; two columns of one lobe are told apart by nothing, so the first stands. */
const axisOf = ({ meaning }: ReadingColumn, { form }: WantedSheet): string =>
  form.per === 'degree' ? (meaning.valve ?? '') : meaning.axis;

/** What says where a column’s values belong: the nearest to its left where there are several, as of two lobes side by side. */
const placesFor = (columns: readonly SheetColumn[], at: number): SheetPlaces => {
  const of = (kind: ColumnMeaning['kind']) => {
    const alike = columns.filter((column) => column.meaning.kind === kind);
    return (alike.findLast((column) => column.at < at) ?? alike[0])?.at;
  };
  return { position: of('position'), cylinder: of('cylinder'), valve: of('valve') };
};

/** The name of a cell, and of the line it stands in, whichever way the sheet runs. */
const namesFor = (sheet: SheetGrid, isTurned: boolean) => ({
  cell: (row: number, column: number): string => {
    const name = isTurned ? cellName(column, row) : cellName(row, column);
    return sheet.name === '' ? name : `${sheet.name}!${name}`;
  },
  row: (at: number): string =>
    isTurned ? `Column ${cellName(0, at).slice(0, -1)}` : `Row ${at + 1}`,
  column: (at: number): string =>
    isTurned ? `Row ${at + 1}` : `Column ${cellName(0, at).slice(0, -1)}`,
});

const columnNotes = (
  columns: readonly SheetColumn[],
  where: (at: number) => string,
): readonly SheetNote[] =>
  columns
    .filter((column) => column.header !== '' && isUnexplained(column))
    .map(({ at, header, hidden }) => ({
      where: where(at),
      detail: hidden
        ? `“${header}” is hidden in the spreadsheet and was not taken. Show it there, or say below what it holds.`
        : `“${header}” was not taken. Say below what it holds if it should be.`,
    }));

const hiddenNote = (rows: readonly number[], name: (at: number) => string): readonly SheetNote[] =>
  rows.length === 0
    ? []
    : [
        {
          where: rows.map(name).join(', '),
          detail:
            'Hidden in the spreadsheet, perhaps by a filter; not taken. Show all rows and save it once more if they should count.',
        },
      ];

/**
 * From one sheet of text to its cells: headings wherever they stand, in whatever order and words, rows
 * by bore (`3 intake`), by cylinder and valve, or by cylinder with the valve in the heading. What is
 * written stays as it is; nothing is dropped without a note.
 */
export const readGrid = (
  grid: SheetGrid,
  wanted: WantedSheet,
  file: SheetFile,
  mapping: Mapping = {},
  isTurned = false,
): ReadSheet => {
  const { rows, hiddenColumns } = grid;
  const names = namesFor(grid, isTurned);
  const found = findColumns(rows, wanted, { mapping, hiddenColumns });
  const base = { turned: isTurned, sheet: grid.name };
  if (found === undefined)
    return { ...base, columns: [], cells: [], notes: [withoutPlaces(wanted)], headingRow: 0 };
  const readings = found.columns.filter(isReading);
  const placed = readings.map((column) => ({
    column,
    places: placesFor(found.columns, column.at),
  }));
  const places = placed[0]?.places ?? placesFor(found.columns, 0);
  const commas = hasDecimalCommas(rows);
  const cells = new Map<string, SheetCell>();
  const notes: SheetNote[] = [];
  const hiddenRows: number[] = [];
  const rowOf = (at: number): { row?: number } => (isTurned ? {} : { row: at });
  for (const [at, row] of rows.entries()) {
    if (at < found.firstRow || !readings.some((one) => /\d/.test(row[one.at] ?? ''))) continue;
    if (grid.hiddenRows.includes(at)) {
      hiddenRows.push(at);
      continue;
    }
    let isPlaced = false;
    const twice = new Set<string>();
    for (const { column, places: own } of placed) {
      const { quantity, unit, depth, valve } = column.meaning;
      const position = placeAt(row, own, valve, wanted);
      if (position === undefined) continue;
      isPlaced = true;
      const written = (row[column.at] ?? '').trim();
      if (written === '') continue;
      const axis = axisOf(column, wanted);
      const place = { position, quantity, depth, axis };
      const key = placeKey(place);
      if (cells.has(key)) {
        twice.add(position);
        continue;
      }
      const source = { fileId: file.fileId, file: file.name, cell: names.cell(at, column.at) };
      const typed = (commas ? withPoint(written) : written).slice(0, 200);
      cells.set(key, { ...place, typed, unit, source });
    }
    if (!isPlaced)
      notes.push({ where: names.row(at), ...unplaced(nameIn(row, places), wanted), ...rowOf(at) });
    for (const position of twice) {
      notes.push({
        where: names.row(at),
        detail: `${position} stands here a second time; the first row was taken, this one was not.`,
        ...rowOf(at),
      });
    }
  }
  const unsaved = grid.unsaved.filter(
    ([row, column]) => row >= found.firstRow && readings.some(({ at }) => at === column),
  );
  return {
    ...base,
    columns: found.columns,
    cells: [...cells.values()],
    notes: [
      ...notes,
      ...unsaved.map(([row, column]) => ({
        where: `Cell ${names.cell(row, column)}`,
        detail:
          'Its formula was saved without a result. Open the file in the spreadsheet, save it there, and add it again.',
        ...rowOf(row),
      })),
      ...hiddenNote(hiddenRows, names.row),
      ...columnNotes(found.columns, names.column),
    ],
    headingRow: isTurned ? 0 : Math.max(0, found.firstRow - 1),
  };
};

/** As `readGrid`, of rows alone. */
export const readSheet = (
  rows: TextRows,
  wanted: WantedSheet,
  file: SheetFile,
  mapping: Mapping = {},
): ReadSheet => readBook([plainGrid(rows)], wanted, file, mapping);

/**
 * The sheet of a file that says most about this engine, whichever way it runs. Others that could have
 * been meant are named.
 */
export const readBook = (
  grids: readonly SheetGrid[],
  wanted: WantedSheet,
  file: SheetFile,
  mapping: Mapping = {},
): ReadSheet => {
  const read = grids
    .filter(({ hidden }) => !hidden)
    .map((grid) => {
      const upright = readGrid(grid, wanted, file, mapping);
      // A sheet that runs from left to right gives a cell or two upright, by chance.
      const across =
        upright.cells.length > 2 ? undefined : readGrid(turned(grid), wanted, file, mapping, true);
      return across !== undefined && across.cells.length > upright.cells.length ? across : upright;
    });
  const [best, ...rest] = read.toSorted((a, b) => b.cells.length - a.cells.length);
  if (best === undefined)
    return {
      columns: [],
      cells: [],
      notes: [withoutPlaces(wanted)],
      headingRow: 0,
      turned: false,
      sheet: '',
    };
  const others = rest.filter(({ cells }) => cells.length > 0);
  return {
    ...best,
    notes: [
      ...best.notes,
      ...others.map(({ sheet, cells }) => ({
        where: `Sheet “${sheet}”`,
        detail: `It holds ${cells.length} values of this engine too; they were not taken, those of “${best.sheet}” were. Leave only the sheet that counts in the file if that is wrong.`,
      })),
    ],
  };
};
