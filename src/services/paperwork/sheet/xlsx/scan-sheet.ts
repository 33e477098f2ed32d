import { type Failure, failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { MOST_COLUMNS, MOST_ROWS, MOST_SPENT, type Spent } from '../spent';
import { attributeOf, scanTags, type Tag } from './scan-tags';

/** A cell that holds something, by where it stands in the sheet's XML. */
export interface ScannedCell {
  /** From 0, here and below. */
  readonly column: number;
  /** `n`, `s`, `str`, `inlineStr`, `b`, `e`, `d`. */
  readonly type: string;
  /** Index into the workbook's cell formats. */
  readonly style: string | undefined;
  /** `<v>…</v>` or `<is>…</is>` as it stands; empty where a formula's result was not saved. */
  readonly content: string;
  /** Behind the cell. */
  readonly to: number;
}

export interface ScannedRow {
  readonly number: number;
  readonly hidden: boolean;
  /** Of the row's opening tag. */
  readonly tag: number;
  /** Behind the row's opening tag, and at its closing one. */
  readonly from: number;
  readonly to: number;
  readonly cells: readonly ScannedCell[];
}

export interface ScannedSheet {
  readonly rows: readonly ScannedRow[];
  readonly hiddenColumns: readonly number[];
}

const REFERENCE = /^([A-Z]{1,3})([1-9]\d{0,6})$/;

const columnAt = (letters: string): number =>
  [...letters].reduce((sum, letter) => sum * 26 + letter.charCodeAt(0) - 64, 0) - 1;

const tooLarge = (name: string): Failure =>
  failure(
    'too-large',
    `The sheet “${name}” has more than ${MOST_ROWS.toLocaleString('en')} rows or ${MOST_COLUMNS} columns. Save only the measurement sheet, with one row per place.`,
  );

interface Open {
  number: number;
  hidden: boolean;
  tag: number;
  from: number;
  cells: ScannedCell[];
}

/** The rows and cells of one sheet that hold something; formats far beyond the values cost nothing. */
export const scanSheet = (
  xml: string,
  name: string,
  spent: Spent,
): Result<ScannedSheet, Failure> => {
  const rows: ScannedRow[] = [];
  const hiddenColumns = new Set<number>();
  let inData = false;
  let row: Open | undefined;
  let nextRow = 0;
  let cell: { tag: Tag; column: number; content: string; formula: boolean } | undefined;
  let nextColumn = 0;
  let contentFrom = -1;

  const openRow = (tag: Tag): void => {
    const number = Number(attributeOf(xml, tag, 'r') ?? nextRow + 1) - 1;
    const hidden = /^(1|true)$/.test(attributeOf(xml, tag, 'hidden') ?? '');
    row = { number, hidden, tag: tag.from, from: tag.to, cells: [] };
    nextRow = number + 1;
    nextColumn = 0;
  };
  const closeRow = (to: number): Failure | undefined => {
    if (row === undefined) return undefined;
    const { cells, number } = row;
    if (cells.length > 0) {
      spent.rows += 1;
      spent.cells += cells.length;
      if (
        !(number < MOST_ROWS) ||
        spent.rows > MOST_SPENT.rows ||
        spent.cells > MOST_SPENT.cells ||
        cells.some(({ column }) => column >= MOST_COLUMNS)
      )
        return tooLarge(name);
      rows.push({ ...row, to });
    }
    row = undefined;
    return undefined;
  };
  const openCell = (tag: Tag): void => {
    const [, letters] = REFERENCE.exec(attributeOf(xml, tag, 'r') ?? '') ?? [];
    const column = letters === undefined ? nextColumn : columnAt(letters);
    nextColumn = column + 1;
    cell = { tag, column, content: '', formula: false };
  };
  const closeCell = (to: number): void => {
    if (row === undefined || cell === undefined) return;
    const { tag, column, content, formula } = cell;
    const type = attributeOf(xml, tag, 't') ?? 'n';
    const style = attributeOf(xml, tag, 's');
    if (content !== '' || formula) row.cells.push({ column, type, style, content, to });
    cell = undefined;
  };
  const hide = (tag: Tag): void => {
    if (!/^(1|true)$/.test(attributeOf(xml, tag, 'hidden') ?? '')) return;
    const from = Number(attributeOf(xml, tag, 'min'));
    const to = Math.min(Number(attributeOf(xml, tag, 'max')), MOST_COLUMNS);
    for (let at = from; at <= to; at += 1) hiddenColumns.add(at - 1);
  };

  const refused = scanTags(xml, spent, (tag) => {
    const { kind } = tag;
    if (tag.name === 'col' && kind !== 'close' && !inData) hide(tag);
    if (tag.name === 'sheetData') inData = kind === 'open';
    if (!inData) return undefined;
    if (tag.name === 'row') {
      if (kind === 'close') return closeRow(tag.from);
      openRow(tag);
      return kind === 'empty' ? closeRow(tag.to) : undefined;
    }
    if (tag.name === 'c') {
      if (kind !== 'close') openCell(tag);
      if (kind !== 'open') closeCell(tag.to);
    } else if (cell !== undefined && (tag.name === 'v' || tag.name === 'is')) {
      if (kind === 'open') contentFrom = tag.from;
      if (kind === 'close' && contentFrom >= 0) cell.content = xml.slice(contentFrom, tag.to);
      if (kind !== 'open') contentFrom = -1;
    } else if (cell !== undefined && tag.name === 'f') cell.formula = true;
    return undefined;
  });
  if (refused !== undefined) return fail(refused);
  return ok({ rows, hiddenColumns: [...hiddenColumns] });
};
