import type { Failure } from '@/domain/failure';
import { type Corrections, neutral } from '@/domain/paperwork/sheet/corrections';
import { TO_CORRECT } from '@/domain/paperwork/sheet/header/read-header';
import { ok, type Result } from '@/domain/result';
import { readCsv } from '../csv/read-csv';
import { writeCsv } from '../csv/write-csv';

export interface ToAnnotate {
  readonly corrections: Corrections;
  /** The row of the headings, from 0. */
  readonly headingRow: number;
  /** A column that was added when the file was given back before; it is written anew. */
  readonly ownColumn: number | undefined;
}

/** The file as it was sent with one more column, in its own encoding and with its own delimiter. */
export const annotateCsv = (
  bytes: Uint8Array,
  { corrections, headingRow, ownColumn }: ToAnnotate,
): Result<Uint8Array, Failure> => {
  const file = readCsv(bytes);
  if (!file.ok) return file;
  const rows = file.value.rows.map((row) => row.filter((_, at) => at !== ownColumn));
  const width = rows.reduce((most, row) => Math.max(most, row.length), 0);
  const annotated = rows.map((row, at) => {
    const words = corrections.get(at) ?? '';
    const added =
      at === headingRow ? [TO_CORRECT, words].filter((part) => part !== '').join(': ') : words;
    if (added === '') return row.map(neutral);
    const padded = Array.from({ length: width }, (_, column) => row[column] ?? '');
    return [...padded, added].map(neutral);
  });
  return ok(writeCsv(annotated, file.value.form));
};
