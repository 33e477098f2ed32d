import { deflateRawSync } from 'node:zlib';

/** A cell: text, a number as spreadsheets store it, or a formula with the result saved beside it. */
export type XlsxCell =
  | string
  | { readonly number: string }
  | { readonly formula: string; readonly result: string }
  | null;

const escaped = (text: string): string =>
  text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;');

const cellXml = (cell: XlsxCell, name: string): string => {
  if (cell === null) return '';
  if (typeof cell === 'string')
    return `<c r="${name}" t="inlineStr"><is><t>${escaped(cell)}</t></is></c>`;
  return 'number' in cell
    ? `<c r="${name}"><v>${cell.number}</v></c>`
    : `<c r="${name}"><f>${escaped(cell.formula)}</f><v>${cell.result}</v></c>`;
};

const HEAD = '<?xml version="1.0" encoding="UTF-8" standalone="yes"?>';
const MAIN = 'http://schemas.openxmlformats.org/spreadsheetml/2006/main';
const REL = 'http://schemas.openxmlformats.org/officeDocument/2006/relationships';
const PACKAGE = 'http://schemas.openxmlformats.org/package/2006';

const crc32 = (bytes: Uint8Array): number => {
  let value = 0xffffffff;
  for (const byte of bytes) {
    value ^= byte;
    for (let bit = 0; bit < 8; bit += 1)
      value = value & 1 ? (value >>> 1) ^ 0xedb88320 : value >>> 1;
  }
  return (value ^ 0xffffffff) >>> 0;
};

/** A ZIP of deflated entries (APPNOTE.TXT). */
export const zipOf = (files: Readonly<Record<string, string>>): Buffer => {
  const locals: Buffer[] = [];
  const directory: Buffer[] = [];
  let offset = 0;
  for (const [name, text] of Object.entries(files)) {
    const bytes = Buffer.from(text);
    const packed = deflateRawSync(bytes);
    const shared = Buffer.alloc(26);
    shared.writeUInt16LE(20, 0);
    shared.writeUInt16LE(8, 4);
    shared.writeUInt32LE(crc32(bytes), 10);
    shared.writeUInt32LE(packed.length, 14);
    shared.writeUInt32LE(bytes.length, 18);
    shared.writeUInt16LE(name.length, 22);
    const local = Buffer.concat([Buffer.from('PK\u0003\u0004'), shared, Buffer.from(name), packed]);
    const tail = Buffer.alloc(14);
    tail.writeUInt32LE(offset, 10);
    directory.push(
      Buffer.concat([
        Buffer.from('PK\u0001\u0002'),
        Buffer.from([20, 0]),
        shared,
        tail,
        Buffer.from(name),
      ]),
    );
    locals.push(local);
    offset += local.length;
  }
  const listed = Buffer.concat(directory);
  const end = Buffer.alloc(18);
  end.writeUInt16LE(directory.length, 4);
  end.writeUInt16LE(directory.length, 6);
  end.writeUInt32LE(listed.length, 8);
  end.writeUInt32LE(offset, 12);
  return Buffer.concat([...locals, listed, Buffer.from('PK\u0005\u0006'), end]);
};

/** A workbook of one sheet (ECMA-376), as small as readers take it. */
export const xlsxOf = (rows: readonly (readonly XlsxCell[])[]): Buffer => {
  const lines = rows.map((row, at) => {
    const cells = row.map((cell, column) =>
      cellXml(cell, `${String.fromCharCode(65 + column)}${at + 1}`),
    );
    return `<row r="${at + 1}">${cells.join('')}</row>`;
  });
  return zipOf({
    '[Content_Types].xml': `${HEAD}<Types xmlns="${PACKAGE}/content-types"><Default Extension="rels" ContentType="application/vnd.openxmlformats-package.relationships+xml"/><Default Extension="xml" ContentType="application/xml"/><Override PartName="/xl/workbook.xml" ContentType="application/vnd.openxmlformats-officedocument.spreadsheetml.sheet.main+xml"/><Override PartName="/xl/worksheets/sheet1.xml" ContentType="application/vnd.openxmlformats-officedocument.spreadsheetml.worksheet+xml"/></Types>`,
    '_rels/.rels': `${HEAD}<Relationships xmlns="${PACKAGE}/relationships"><Relationship Id="rId1" Type="${REL}/officeDocument" Target="xl/workbook.xml"/></Relationships>`,
    'xl/workbook.xml': `${HEAD}<workbook xmlns="${MAIN}" xmlns:r="${REL}"><sheets><sheet name="Lifters" sheetId="1" r:id="rId1"/></sheets></workbook>`,
    'xl/_rels/workbook.xml.rels': `${HEAD}<Relationships xmlns="${PACKAGE}/relationships"><Relationship Id="rId1" Type="${REL}/worksheet" Target="worksheets/sheet1.xml"/></Relationships>`,
    'xl/worksheets/sheet1.xml': `${HEAD}<worksheet xmlns="${MAIN}"><sheetData>${lines.join('')}</sheetData></worksheet>`,
  });
};
