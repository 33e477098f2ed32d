import { type Failure, failure } from '@/domain/failure';
import { KIND_WORDS, sniff } from '@/domain/paperwork/file/sniff';
import { plainGrid, type SheetGrid } from '@/domain/paperwork/sheet/sheet-grid';
import { fail, ok, type Result } from '@/domain/result';
import { readCsv } from './csv/read-csv';
import { nothingSpent, type Spent } from './spent';
import { readXlsx } from './xlsx/read-xlsx';

export const XLSX = 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet';

export interface SheetRows {
  readonly type: string;
  readonly grids: readonly SheetGrid[];
}

const isProgram = (bytes: Uint8Array): boolean =>
  (bytes[0] === 0x4d && bytes[1] === 0x5a) ||
  (bytes[0] === 0x7f && bytes[1] === 0x45 && bytes[2] === 0x4c && bytes[3] === 0x46);

/** The old binary form of spreadsheets, and of XLSX files locked with a password. */
const isOldBinary = (bytes: Uint8Array): boolean =>
  [0xd0, 0xcf, 0x11, 0xe0, 0xa1, 0xb1, 0x1a, 0xe1].every((byte, at) => bytes[at] === byte);

const unsupported = (detail: string) => fail(failure('unsupported-file', detail));

/** A CSV or XLSX file as sheets of text, told apart by its content; `spent` says what it took. */
export const readSheetRows = async (
  bytes: Uint8Array,
  spent: Spent = nothingSpent(),
): Promise<Result<SheetRows, Failure>> => {
  const kind = sniff(bytes);
  if (kind === 'zip') {
    const grids = await readXlsx(bytes, spent);
    return grids.ok ? ok({ type: XLSX, grids: grids.value }) : grids;
  }
  if (isProgram(bytes))
    return unsupported(
      'By its content this is a program, whatever its name says. Numbers are read from a CSV or XLSX sheet.',
    );
  if (isOldBinary(bytes))
    return unsupported(
      'This is a spreadsheet of the old binary form, or one locked with a password. Save it as “XLSX” without a password, or as CSV.',
    );
  if (kind !== 'other')
    return unsupported(
      `By its content this is ${KIND_WORDS[kind]}. Numbers are read from a CSV or XLSX sheet.`,
    );
  const file = readCsv(bytes, spent);
  return file.ok ? ok({ type: 'text/csv', grids: [plainGrid(file.value.rows)] }) : file;
};
