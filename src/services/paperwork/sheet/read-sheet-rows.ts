import { type Failure, failure } from '@/domain/failure';
import { KIND_WORDS, sniff } from '@/domain/paperwork/file/sniff';
import type { TextRows } from '@/domain/paperwork/sheet/find-columns';
import { fail, ok, type Result } from '@/domain/result';
import { readCsv } from './read-csv';
import { readXlsx } from './read-xlsx';

const XLSX = 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet';

export interface SheetRows {
  readonly type: string;
  readonly rows: TextRows;
}

/** A CSV or XLSX file as rows of text, told apart by its content. */
export const readSheetRows = async (bytes: Uint8Array): Promise<Result<SheetRows, Failure>> => {
  const kind = sniff(bytes);
  if (kind === 'zip') {
    const rows = await readXlsx(bytes);
    return rows.ok ? ok({ type: XLSX, rows: rows.value }) : rows;
  }
  if (kind !== 'other') {
    const detail = `By its content this is ${KIND_WORDS[kind]}. Numbers are read from a CSV or XLSX sheet.`;
    return fail(failure('unsupported-file', detail));
  }
  const rows = readCsv(bytes);
  return rows.ok ? ok({ type: 'text/csv', rows: rows.value }) : rows;
};
