import { type Failure, failure } from '@/domain/failure';
import { cellName } from '@/domain/paperwork/sheet/header/column-meaning';
import { TO_CORRECT } from '@/domain/paperwork/sheet/header/read-header';
import { fail, ok, type Result } from '@/domain/result';
import { nothingSpent } from '../spent';
import { damagedXlsx, openPackage } from '../xlsx/open-package';
import { type ScannedRow, scanSheet } from '../xlsx/scan-sheet';
import { readWorkbook } from '../xlsx/workbook';
import { writeZip } from '../xlsx/write-zip';
import type { ToAnnotate } from './annotate-csv';

const escaped = (text: string): string =>
  [...text]
    .filter((char) => char >= ' ')
    .join('')
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;');

/** Text is written as text: no program takes it for a formula. */
const cellXml = (row: number, column: number, words: string): string =>
  `<c r="${cellName(row, column)}" t="inlineStr"><is><t xml:space="preserve">${escaped(words)}</t></is></c>`;

/** A row with its own cells as they stand, then ours; formats of empty cells behind them go. */
const rowXml = (xml: string, row: ScannedRow, column: number, words: string): string => {
  const kept = row.cells.filter((cell) => cell.column < column).at(-1);
  const tag = xml.slice(row.tag, row.from).replace(/\sspans\s*=\s*("[^"]*"|'[^']*')/, '');
  const own = kept === undefined ? '' : xml.slice(row.from, kept.to);
  return `${tag}${own}${words === '' ? '' : cellXml(row.number, column, words)}`;
};

const annotated = (
  xml: string,
  rows: readonly ScannedRow[],
  { corrections, headingRow, ownColumn }: ToAnnotate,
): string => {
  const last = Math.max(...rows.flatMap((row) => row.cells.map((cell) => cell.column)));
  const column = ownColumn === last ? ownColumn : last + 1;
  const heading = rows.findLast((row) => row.number <= headingRow) ?? rows[0];
  let done = '';
  let at = 0;
  for (const row of rows) {
    const words = corrections.get(row.number) ?? '';
    const added =
      row === heading ? [TO_CORRECT, words].filter((part) => part !== '').join(': ') : words;
    if (added === '' && !row.cells.some((cell) => cell.column >= column)) continue;
    done += xml.slice(at, row.tag) + rowXml(xml, row, column, added);
    at = row.to;
  }
  return (done + xml.slice(at)).replace(/<(\w+:)?dimension\s[^>]*\/>/, '');
};

const PREFIXED =
  'This workbook is written in an unusual way. Correct the values here, or save it once more and add it again.';

/** The workbook as it was sent, formulas and formats and all, with one more column of text in the sheet that was read. */
export const annotateXlsx = (
  bytes: Uint8Array,
  sheetName: string,
  what: ToAnnotate,
): Result<Uint8Array, Failure> => {
  const spent = nothingSpent();
  const file = openPackage(bytes, spent);
  if (!file.ok) return file;
  const book = readWorkbook(file.value, spent);
  if (!book.ok) return book;
  const { sheets } = book.value;
  const sheet = sheetName === '' ? sheets[0] : sheets.find(({ name }) => name === sheetName);
  if (sheet === undefined) return damagedXlsx();
  const xml = file.value.read(sheet.part);
  if (!xml.ok) return xml;
  const scanned = scanSheet(xml.value, sheet.name, spent);
  if (!scanned.ok) return scanned;
  if (!/<sheetData[\s>]/.test(xml.value)) return fail(failure('unsupported-file', PREFIXED));
  const text = annotated(xml.value, scanned.value.rows, what);
  return ok(
    writeZip(
      file.value.entries.map((entry) =>
        entry.name === sheet.part
          ? { name: entry.name, text }
          : { name: entry.name, from: bytes, entry },
      ),
    ),
  );
};
