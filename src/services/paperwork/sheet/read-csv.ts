import { parse } from 'csv-parse/sync';
import { type Failure, failure } from '@/domain/failure';
import type { TextRows } from '@/domain/paperwork/sheet/find-columns';
import { fail, ok, type Result } from '@/domain/result';
import { readText } from './read-text';

export const MOST_ROWS = 2_000;
export const MOST_COLUMNS = 100;
const MOST_CELL = 2_000;

const DELIMITERS = [',', ';', '\t', '|'] as const;

/** Control characters that no sheet holds and every binary file does. */
const looksBinary = (text: string): boolean =>
  // biome's control-character rule speaks of patterns; here code points are compared.
  [...text.slice(0, 4_000)].some((char) => {
    const code = char.codePointAt(0) ?? 0;
    return code < 9 || (code > 13 && code < 32) || code === 0xfffd;
  });

const looksLikeMarkup = (text: string): boolean =>
  /^\s*<(!doctype|html|\?xml|svg|table)/i.test(text);

/** The mark that stands most evenly in the lines; a first line `sep=;` says it outright. */
const delimiterOf = (text: string): { readonly delimiter: string; readonly body: string } => {
  const stated = /^sep=(.)\r?\n/i.exec(text);
  if (stated?.[1] !== undefined)
    return { delimiter: stated[1], body: text.slice(stated[0].length) };
  const lines = text
    .split(/\r?\n|\r/)
    .filter((line) => line.trim() !== '')
    .slice(0, 50);
  const score = (delimiter: string): number => {
    const counts = lines.map((line) => line.split(delimiter).length - 1).toSorted((a, b) => a - b);
    return counts[Math.floor(counts.length / 2)] ?? 0;
  };
  // Decimal commas are many: a semicolon, a tab or a bar that stands in most lines goes before them.
  const others = DELIMITERS.filter((delimiter) => delimiter !== ',' && score(delimiter) > 0);
  const [best = ','] = others.toSorted((a, b) => score(b) - score(a));
  return { delimiter: best, body: text };
};

const refuse = (detail: string): { ok: false; failure: Failure } =>
  fail(failure('damaged-file', detail));

/** A CSV file as rows of text, as it stands. Broken quotation marks and binary files are refused with the line. */
export const readCsv = (bytes: Uint8Array): Result<TextRows, Failure> => {
  const text = readText(bytes);
  if (text.trim() === '') return refuse('The file is empty.');
  if (looksBinary(text) || looksLikeMarkup(text))
    return fail(
      failure('unsupported-file', 'This is no CSV file. Save the sheet as “CSV” and add it again.'),
    );
  const { delimiter, body } = delimiterOf(text);
  try {
    const rows: string[][] = parse(body, {
      delimiter,
      relax_column_count: true,
      relax_quotes: true,
      skip_empty_lines: false,
      max_record_size: 200_000,
      to: MOST_ROWS + 1,
    });
    if (rows.length > MOST_ROWS)
      return refuse(`The file has more than ${MOST_ROWS} rows. A sheet has one row per place.`);
    if (rows.some((row) => row.length > MOST_COLUMNS))
      return refuse(`A row has more than ${MOST_COLUMNS} columns.`);
    if (rows.some((row) => row.some((cell) => cell.length > MOST_CELL)))
      return refuse(`A cell holds more than ${MOST_CELL} characters. Is a quotation mark open?`);
    return ok(rows);
  } catch (error) {
    const lines =
      typeof error === 'object' && error !== null && 'lines' in error ? error.lines : undefined;
    return refuse(
      `${typeof lines === 'number' ? `Line ${lines}` : 'The file'} cannot be read: a quotation mark is open or a record is too long. Save the sheet as CSV once more.`,
    );
  }
};
