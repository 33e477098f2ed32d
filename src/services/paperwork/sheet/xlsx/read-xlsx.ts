import readXlsxFile from 'read-excel-file/node';
import { type Failure, failure } from '@/domain/failure';
import type { SheetGrid } from '@/domain/paperwork/sheet/sheet-grid';
import { fail, ok, type Result } from '@/domain/result';
import { MOST_CELL, type Spent } from '../spent';
import { bareSheet } from './bare-sheet';
import { damagedXlsx, openPackage } from './open-package';
import { type ScannedSheet, scanSheet } from './scan-sheet';
import { shownNumber } from './shown-number';
import { readWorkbook, type Workbook } from './workbook';
import { writeZip } from './write-zip';

const MAIN = 'http://schemas.openxmlformats.org/spreadsheetml/2006/main';
const REL = 'http://schemas.openxmlformats.org/officeDocument/2006/relationships';

const relation = (id: string, kind: string, target: string): string =>
  `<Relationship Id="${id}" Type="${REL}/${kind}" Target="${target}"/>`;

/** The workbook with what was looked through and nothing else. */
const bareWorkbook = (book: Workbook, sheets: readonly ScannedSheet[]): Buffer => {
  const named = book.sheets.map(
    ({ rawName }, at) =>
      `<sheet name="${rawName.replaceAll('"', '&quot;')}" sheetId="${at + 1}" r:id="rId${at + 1}"/>`,
  );
  const relations = sheets.map((_, at) =>
    relation(`rId${at + 1}`, 'worksheet', `worksheets/sheet${at + 1}.xml`),
  );
  const parts = [
    {
      name: 'xl/workbook.xml',
      text: `<workbook xmlns="${MAIN}" xmlns:r="${REL}"><workbookPr${book.from1904 ? ' date1904="1"' : ''}/><sheets>${named.join('')}</sheets></workbook>`,
    },
    {
      name: 'xl/_rels/workbook.xml.rels',
      text: `<Relationships xmlns="http://schemas.openxmlformats.org/package/2006/relationships">${relations.join('')}${relation('rIdStyles', 'styles', 'styles.xml')}${relation('rIdStrings', 'sharedStrings', 'sharedStrings.xml')}</Relationships>`,
    },
    { name: 'xl/styles.xml', text: book.stylesXml },
    { name: 'xl/sharedStrings.xml', text: book.stringsXml },
    ...sheets.map((sheet, at) => ({
      name: `xl/worksheets/sheet${at + 1}.xml`,
      text: bareSheet(sheet),
    })),
  ];
  return writeZip(parts.filter(({ text }) => text !== ''));
};

const textOf = (value: unknown): string => {
  if (value === null || value === undefined) return '';
  return value instanceof Date ? value.toISOString().slice(0, 10) : String(value);
};

const LONG_CELL = `A cell holds more than ${MOST_CELL.toLocaleString('en')} characters. Save only the measurement sheet.`;

type Values = readonly (readonly unknown[])[];

const gridOf = (
  book: Workbook,
  at: number,
  scanned: ScannedSheet,
  values: Values,
): SheetGrid | undefined => {
  const sheet = book.sheets[at];
  if (sheet === undefined) return undefined;
  const rows = values.map((row) => row.map(textOf));
  const unsaved: [number, number][] = [];
  for (const { number, cells } of scanned.rows) {
    for (const { column, type, style, content } of cells) {
      if (content === '') unsaved.push([number, column]);
      const row = rows[number];
      const value = values[number]?.[column];
      if (row === undefined || type !== 'n' || value instanceof Date) continue;
      const format = style === undefined ? undefined : book.formats[Number(style)];
      row[column] = shownNumber(row[column] ?? '', format);
    }
  }
  return {
    name: book.sheets.length > 1 ? sheet.name : '',
    hidden: sheet.hidden,
    rows,
    hiddenRows: scanned.rows.filter(({ hidden }) => hidden).map(({ number }) => number),
    hiddenColumns: scanned.hiddenColumns,
    unsaved,
  };
};

/**
 * The sheets of an XLSX file as rows of text; formulas give the result that was saved with them. The
 * package's reader gets what was looked through, repacked, so that it meets nothing else.
 */
export const readXlsx = async (
  bytes: Uint8Array,
  spent: Spent,
): Promise<Result<readonly SheetGrid[], Failure>> => {
  const file = openPackage(bytes, spent);
  if (!file.ok) return file;
  const book = readWorkbook(file.value, spent);
  if (!book.ok) return book;
  const scanned: ScannedSheet[] = [];
  for (const { name, part } of book.value.sheets) {
    const xml = file.value.read(part);
    if (!xml.ok) return xml;
    if (xml.value === '') return damagedXlsx();
    const sheet = scanSheet(xml.value, name, spent);
    if (!sheet.ok) return sheet;
    scanned.push(sheet.value);
  }
  try {
    const read = await readXlsxFile(bareWorkbook(book.value, scanned), {
      parseNumber: (text) => text,
      trim: true,
    });
    const grids = read.flatMap(({ data }, at) => {
      const sheet = scanned[at];
      return (sheet && gridOf(book.value, at, sheet, data)) ?? [];
    });
    const long = grids.some(({ rows }) =>
      rows.some((row) => row.some((c) => c.length > MOST_CELL)),
    );
    return long ? fail(failure('damaged-file', LONG_CELL)) : ok(grids);
  } catch {
    return damagedXlsx();
  }
};
