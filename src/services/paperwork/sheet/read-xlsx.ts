import { readSheet } from 'read-excel-file/node';
import { type Failure, failure } from '@/domain/failure';
import type { TextRows } from '@/domain/paperwork/sheet/find-columns';
import { fail, ok, type Result } from '@/domain/result';
import { MOST_COLUMNS, MOST_ROWS } from './read-csv';
import { refuseBomb } from './refuse-bomb';

/** Spreadsheets keep numbers as doubles, 0.844 as 0.84399999999999997: fifteen digits are what was meant. */
const asWritten = (text: string): string => String(Number(Number(text).toPrecision(15)));

const textOf = (value: unknown): string => {
  if (value === null || value === undefined) return '';
  return value instanceof Date ? value.toISOString().slice(0, 10) : String(value);
};

/** The first sheet of an XLSX file as rows of text; formulas give the result that was saved with them. */
export const readXlsx = async (bytes: Uint8Array): Promise<Result<TextRows, Failure>> => {
  const entries = refuseBomb(bytes);
  if (!entries.ok) return entries;
  if (!entries.value.includes('xl/workbook.xml')) {
    const detail =
      'This packed file is no XLSX sheet. Save the sheet as XLSX or CSV and add it again.';
    return fail(failure('unsupported-file', detail));
  }
  try {
    const rows = await readSheet(Buffer.from(bytes), { parseNumber: asWritten, trim: true });
    if (rows.length > MOST_ROWS || rows.some((row) => row.length > MOST_COLUMNS)) {
      const detail = `The sheet has more than ${MOST_ROWS} rows or ${MOST_COLUMNS} columns.`;
      return fail(failure('damaged-file', detail));
    }
    return ok(rows.map((row) => row.map(textOf)));
  } catch {
    const detail = 'This XLSX file cannot be read. Save the sheet once more, or save it as CSV.';
    return fail(failure('damaged-file', detail));
  }
};
