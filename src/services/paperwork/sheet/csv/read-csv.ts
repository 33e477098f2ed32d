import { parse } from 'csv-parse/sync';
import { type Failure, failure } from '@/domain/failure';
import type { TextRows } from '@/domain/paperwork/sheet/sheet-grid';
import { fail, ok, type Result } from '@/domain/result';
import { readText } from '../read-text';
import { MOST_CELL, MOST_COLUMNS, MOST_ROWS, MOST_SPENT, nothingSpent, type Spent } from '../spent';
import { type CsvForm, delimiterOf, encodingOf, newlineOf } from './csv-form';

export interface CsvFile {
  readonly rows: TextRows;
  readonly form: CsvForm;
}

const UNREADABLE = 'This is no CSV file. Save the sheet as “CSV” and add it again.';
const UNMARKED =
  'This looks like UTF-16 text without its mark. Save the sheet as “CSV UTF-8” and add it again.';

/** Control characters that no sheet holds and every binary file does. */
const looksBinary = (text: string): boolean =>
  text.includes('\u0000') ||
  // biome's control-character rule speaks of patterns; here code points are compared.
  [...text.slice(0, 4_000)].some((char) => {
    const code = char.codePointAt(0) ?? 0;
    return code < 9 || (code > 13 && code < 32) || code === 0xfffd;
  });

const looksLikeMarkup = (text: string): boolean =>
  /^\s*<(!doctype|html|\?xml|svg|table)/i.test(text.slice(0, 1_000));

/** Every second byte nought, as Western text in UTF-16 has it. */
const looksUnmarked = (bytes: Uint8Array): boolean => {
  const head = bytes.subarray(0, 4_000);
  const zeros = (from: number): number =>
    head.filter((byte, at) => at % 2 === from && byte === 0).length;
  const [even, odd] = [zeros(0), zeros(1)];
  return Math.max(even, odd) > head.length / 4 && Math.min(even, odd) < head.length / 50;
};

/** More delimiters in one line than columns and a long cell could need: not worth splitting. */
const hasEndlessLine = (text: string, delimiter: string): boolean => {
  let count = 0;
  for (const char of text) {
    if (char === '\n' || char === '\r') count = 0;
    else if (char === delimiter) count += 1;
    if (count > MOST_COLUMNS + MOST_CELL) return true;
  }
  return false;
};

const refuse = (detail: string): { ok: false; failure: Failure } =>
  fail(failure('damaged-file', detail));

const WORDS = {
  rows: `The file has more than ${MOST_ROWS} rows. A sheet has one row per place.`,
  columns: `A row has more than ${MOST_COLUMNS} columns. Save only the measurement sheet.`,
  cells: `The file has more than ${MOST_SPENT.cells} cells. Save only the measurement sheet.`,
  cell: `A cell holds more than ${MOST_CELL} characters. Is a quotation mark open?`,
} as const;

class Refused extends Error {}

/** A CSV file as rows of text, as it stands. Broken quotation marks and binary files are refused with the line. */
export const readCsv = (
  bytes: Uint8Array,
  spent: Spent = nothingSpent(),
): Result<CsvFile, Failure> => {
  const text = readText(bytes);
  if (text.trim() === '') return refuse('The file is empty.');
  if (encodingOf(bytes).encoding === 'utf-8' && looksUnmarked(bytes))
    return fail(failure('unsupported-file', UNMARKED));
  if (looksBinary(text) || looksLikeMarkup(text))
    return fail(failure('unsupported-file', UNREADABLE));
  const { delimiter, body } = delimiterOf(text);
  if (hasEndlessLine(body, delimiter)) return refuse(WORDS.columns);
  // Thrown from within the package's loop: it is the only way to stop it at a bound.
  const count = (row: string[]): string[] => {
    spent.rows += 1;
    spent.cells += row.length;
    if (spent.rows > MOST_ROWS) throw new Refused(WORDS.rows);
    if (row.length > MOST_COLUMNS) throw new Refused(WORDS.columns);
    if (spent.cells > MOST_SPENT.cells) throw new Refused(WORDS.cells);
    if (row.some((cell) => cell.length > MOST_CELL)) throw new Refused(WORDS.cell);
    return row;
  };
  try {
    const rows: string[][] = parse(body, {
      delimiter,
      relax_column_count: true,
      relax_quotes: true,
      skip_empty_lines: false,
      max_record_size: 200_000,
      on_record: count,
    });
    const form = {
      ...encodingOf(bytes),
      delimiter,
      stated: body !== text,
      newline: newlineOf(text),
    };
    return ok({ rows, form });
  } catch (error) {
    if (error instanceof Refused) return refuse(error.message);
    const lines =
      typeof error === 'object' && error !== null && 'lines' in error ? error.lines : undefined;
    return refuse(
      `${typeof lines === 'number' ? `Line ${lines}` : 'The file'} cannot be read: a quotation mark is open or a record is too long. Save the sheet as CSV once more.`,
    );
  }
};
