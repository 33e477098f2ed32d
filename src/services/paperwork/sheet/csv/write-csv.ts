import type { TextRows } from '@/domain/paperwork/sheet/sheet-grid';
import type { CsvForm } from './csv-form';
import { inWindows1252 } from './windows-1252';

const quoted = (cell: string, delimiter: string): string =>
  /["\r\n]/.test(cell) || cell.includes(delimiter) ? `"${cell.replaceAll('"', '""')}"` : cell;

const inUtf16 = (text: string, isLittle: boolean): Uint8Array => {
  const bytes = Buffer.from(text, 'utf16le');
  return isLittle ? bytes : bytes.swap16();
};

const encoded = (text: string, { encoding, mark }: CsvForm): Uint8Array => {
  const marked = mark ? `\uFEFF${text}` : text;
  if (encoding === 'utf-16le' || encoding === 'utf-16be')
    return inUtf16(marked, encoding === 'utf-16le');
  if (encoding === 'utf-8') return Buffer.from(marked);
  // What the code page lacks is written plainly: it stands in our own words only.
  const plain = text.replaceAll('−', '-').replaceAll('″', '"');
  return inWindows1252(plain);
};

/** A CSV file (RFC 4180) in the form of another: its encoding, delimiter and line ends. */
export const writeCsv = (rows: TextRows, form: CsvForm): Uint8Array => {
  const { delimiter, newline, stated } = form;
  const lines = rows.map((row) => row.map((cell) => quoted(cell, delimiter)).join(delimiter));
  return encoded([...(stated ? [`sep=${delimiter}`] : []), ...lines, ''].join(newline), form);
};

/** With the mark by which spreadsheets recognise UTF-8. */
export const PLAIN_FORM: CsvForm = {
  encoding: 'utf-8',
  mark: true,
  delimiter: ',',
  stated: false,
  newline: '\r\n',
};
