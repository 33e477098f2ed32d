import { constants, deflateRawSync } from 'node:zlib';

/** A part of a packed file, as honest or dishonest as it is made. */
export interface Part {
  readonly name: string;
  readonly packed: Uint8Array;
  /** What the directory says that it unfolds to. */
  readonly stated?: number;
  readonly method?: number;
  readonly encrypted?: boolean;
  /** Lies in the file, and the directory does not list it. */
  readonly unlisted?: boolean;
  /** Listed at the place of the part before it. */
  readonly sharesPlace?: boolean;
}

export const deflated = (text: string | Uint8Array): Uint8Array =>
  deflateRawSync(typeof text === 'string' ? Buffer.from(text) : text);

/** `times` copies of a text as one deflate stream, without ever holding them: blocks behind a full flush stand alone. */
export const repeated = (text: string, times: number, head = '', tail = ''): Uint8Array => {
  const block = (part: string) =>
    deflateRawSync(Buffer.from(part), { finishFlush: constants.Z_FULL_FLUSH });
  const body = block(text);
  return Buffer.concat([
    block(head),
    ...Array.from({ length: times }, () => body),
    deflateRawSync(Buffer.from(tail)),
  ]);
};

export const part = (name: string, text: string): Part => ({
  name,
  packed: deflated(text),
  stated: Buffer.byteLength(text),
});

/** A ZIP (APPNOTE.TXT 4.3) that says of its parts what it is told to say. */
export const packed = (parts: readonly Part[]): Buffer => {
  const body: Uint8Array[] = [];
  const directory: Uint8Array[] = [];
  let offset = 0;
  let listed = 0;
  let place = 0;
  for (const one of parts) {
    const { name, packed: bytes, stated = 0, method = 8, encrypted = false } = one;
    const head = Buffer.alloc(26);
    head.writeUInt16LE(20, 0);
    head.writeUInt16LE(encrypted ? 1 : 0, 2);
    head.writeUInt16LE(method, 4);
    head.writeUInt32LE(bytes.length, 14);
    head.writeUInt32LE(stated, 18);
    head.writeUInt16LE(name.length, 22);
    if (one.sharesPlace !== true) {
      place = offset;
      body.push(Buffer.from('PK\u0003\u0004'), head, Buffer.from(name), bytes);
      offset += 30 + name.length + bytes.length;
    }
    if (one.unlisted === true) continue;
    const tail = Buffer.alloc(14);
    tail.writeUInt32LE(place, 10);
    directory.push(Buffer.from('PK\u0001\u0002'), Buffer.from([20, 0]), head, tail);
    directory.push(Buffer.from(name));
    listed += 1;
  }
  const list = Buffer.concat(directory);
  const end = Buffer.alloc(18);
  end.writeUInt16LE(listed, 4);
  end.writeUInt16LE(listed, 6);
  end.writeUInt32LE(list.length, 8);
  end.writeUInt32LE(offset, 12);
  return Buffer.concat([...body, list, Buffer.from('PK\u0005\u0006'), end]);
};

const MAIN = 'http://schemas.openxmlformats.org/spreadsheetml/2006/main';
const REL = 'http://schemas.openxmlformats.org/officeDocument/2006/relationships';

export const sheetXml = (data: string, before = ''): string =>
  `<?xml version="1.0"?>${before}<worksheet xmlns="${MAIN}"><sheetData>${data}</sheetData></worksheet>`;

export const bookXml = (names: readonly string[]): string =>
  `<workbook xmlns="${MAIN}" xmlns:r="${REL}"><sheets>${names
    .map((name, at) => `<sheet name="${name}" sheetId="${at + 1}" r:id="rId${at + 1}"/>`)
    .join('')}</sheets></workbook>`;

export const relationsXml = (count: number): string =>
  `<Relationships xmlns="http://schemas.openxmlformats.org/package/2006/relationships">${Array.from(
    { length: count },
    (_, at) =>
      `<Relationship Id="rId${at + 1}" Type="${REL}/worksheet" Target="worksheets/sheet${at + 1}.xml"/>`,
  ).join('')}</Relationships>`;

/** The parts of a workbook of one sheet around the part in question. */
export const workbook = (sheet: Part | string, more: readonly Part[] = []): Buffer =>
  packed([
    part('xl/workbook.xml', bookXml(['Lifters'])),
    part('xl/_rels/workbook.xml.rels', relationsXml(1)),
    typeof sheet === 'string' ? part('xl/worksheets/sheet1.xml', sheet) : sheet,
    ...more,
  ]);

/** A small honest sheet. */
export const GOOD_ROWS =
  '<row r="1"><c r="A1" t="inlineStr"><is><t>Position</t></is></c><c r="B1" t="inlineStr"><is><t>Lifter</t></is></c></row>' +
  '<row r="2"><c r="A2" t="inlineStr"><is><t>3 intake</t></is></c><c r="B2"><v>0.8423</v></c></row>';
