import writeXlsxFile from 'write-excel-file/node';
import { type SheetTemplate, templateRows } from '@/domain/paperwork/sheet/template';
import { PLAIN_FORM, writeCsv } from '../csv/write-csv';

export const templateCsv = (template: SheetTemplate): Uint8Array =>
  writeCsv(templateRows(template), PLAIN_FORM);

const columnWidth = (heading: string): number => Math.max(12, heading.length + 2);

/** A workbook whose cells for values show four decimals, so that a trailing zero stays to be seen. */
export const templateXlsx = ({ notes, heading, places }: SheetTemplate): Promise<Uint8Array> => {
  const text = (value: string, bold = false) => ({
    value,
    type: String,
    ...(bold ? { fontWeight: 'bold' as const } : {}),
  });
  const empty = () => ({ type: Number, format: '0.0000' });
  const rows = [
    ...notes.map((note, at) => [text(note, at === 0)]),
    [],
    heading.map((title) => ({ ...text(title, true), bottomBorderStyle: 'medium' as const })),
    ...places.map((place) => [text(place, true), ...heading.slice(1).map(empty)]),
  ];
  return writeXlsxFile(rows, {
    sheet: 'Measured',
    columns: heading.map((title) => ({ width: columnWidth(title) })),
    stickyRowsCount: notes.length + 2,
    stickyColumnsCount: 1,
  }).toBuffer();
};
