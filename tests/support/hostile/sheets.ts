import { gzipSync } from 'node:zlib';
import {
  bookXml,
  deflated,
  GOOD_ROWS,
  packed,
  part,
  relationsXml,
  repeated,
  sheetXml,
  workbook,
} from './packed';

/** A file made to harm whoever reads it, and the words it must be refused with. */
export interface HostileSheet {
  readonly name: string;
  readonly make: () => Uint8Array;
  /** Part of the words; absent where the file is harmless once it is read with care, and must be read. */
  readonly words?: string;
}

const utf8 = (text: string): Uint8Array => Buffer.from(text);
const SHEET = 'xl/worksheets/sheet1.xml';
const STRINGS = 'xl/sharedStrings.xml';
const MEGABYTE = ' '.repeat(1_000_000);

const LARGE = 'holds more than 20 MB';
const DECLARES = 'declares entities of its own';
const DAMAGED = 'is damaged';
const MANY_TAGS = 'holds more than 600,000 elements';
const ROWS = 'has more than 2,000 rows or 100 columns';

const LAUGHS = `<!DOCTYPE l [<!ENTITY a "${'ha'.repeat(50)}">${['b', 'c', 'd', 'e', 'f', 'g']
  .map((name, at) => `<!ENTITY ${name} "${`&${'abcdef'[at]};`.repeat(50)}">`)
  .join('')}]>`;

const strings = (xml: string) => part(STRINGS, `<sst>${xml}</sst>`);
const cellOf = (index: number) => `<row r="1"><c r="A1" t="s"><v>${index}</v></c></row>`;

const PACKED: readonly HostileSheet[] = [
  {
    name: 'a gigabyte of nothing, packed to a megabyte',
    make: () => workbook({ name: SHEET, packed: repeated(MEGABYTE, 1_000), stated: 1_000_000_000 }),
    words: LARGE,
  },
  {
    name: 'the same, and its directory says a thousand bytes',
    make: () => workbook({ name: SHEET, packed: repeated(MEGABYTE, 1_000), stated: 1_000 }),
    words: LARGE,
  },
  {
    name: 'four gigabytes declared',
    make: () => workbook({ name: SHEET, packed: deflated('x'), stated: 0xffffffff }),
    words: LARGE,
  },
  {
    name: 'nine thousand parts',
    make: () =>
      workbook(
        sheetXml(GOOD_ROWS),
        Array.from({ length: 9_000 }, (_, at) => part(`p${at}`, 'x')),
      ),
    words: 'holds more than 200 parts',
  },
  {
    name: 'packed files in packed files',
    make: () => {
      const inner = packed([{ name: 'bomb', packed: repeated(MEGABYTE, 200), stated: 10 }]);
      return packed([{ name: 'more.zip', packed: inner, method: 0, stated: inner.length }]);
    },
    words: 'no XLSX sheet',
  },
  {
    name: 'twenty sheets that share one place',
    make: () => {
      const rows = repeated(MEGABYTE, 8, sheetXml(''));
      return packed([
        part('xl/workbook.xml', bookXml(Array.from({ length: 20 }, (_, at) => `S${at}`))),
        part('xl/_rels/workbook.xml.rels', relationsXml(20)),
        ...Array.from({ length: 20 }, (_, at) => ({
          name: `xl/worksheets/sheet${at + 1}.xml`,
          packed: rows,
          stated: 500_000,
          sharesPlace: at > 0,
        })),
      ]);
    },
    words: LARGE,
  },
  {
    name: 'a part that the directory does not list',
    make: () =>
      workbook(sheetXml(GOOD_ROWS), [
        { name: SHEET, packed: repeated(MEGABYTE, 500), stated: 500_000_000, unlisted: true },
      ]),
  },
  {
    name: 'two parts of one name',
    make: () => workbook(sheetXml(GOOD_ROWS), [part(SHEET, sheetXml(''))]),
    words: DAMAGED,
  },
  {
    name: 'locked with a password',
    make: () => workbook({ name: SHEET, packed: deflated('x'), encrypted: true, stated: 1 }),
    words: 'locked with a password',
  },
  {
    name: 'cut short',
    make: () => workbook(sheetXml(GOOD_ROWS)).subarray(0, 600),
    words: DAMAGED,
  },
  {
    name: 'a part packed in a way nobody uses',
    make: () => workbook({ name: SHEET, packed: deflated('x'), method: 99, stated: 1 }),
    words: DAMAGED,
  },
  {
    name: 'a workbook with macros',
    make: () => workbook(sheetXml(GOOD_ROWS), [part('xl/vbaProject.bin', 'x')]),
    words: 'holds macros',
  },
  {
    name: 'a workbook whose sheet lies outside the file',
    make: () =>
      packed([
        part('xl/workbook.xml', bookXml(['Lifters'])),
        part(
          'xl/_rels/workbook.xml.rels',
          relationsXml(1).replace('worksheets/', '../../../../etc/'),
        ),
      ]),
    words: DAMAGED,
  },
];

const XML: readonly HostileSheet[] = [
  {
    name: 'entities of entities among the strings',
    make: () =>
      workbook(sheetXml(cellOf(0)), [
        part(STRINGS, `<?xml version="1.0"?>${LAUGHS}<sst><si><t>&g;</t></si></sst>`),
      ]),
    words: DECLARES,
  },
  {
    name: 'entities of entities in the sheet',
    make: () =>
      workbook(
        sheetXml('<row r="1"><c r="A1" t="inlineStr"><is><t>&g;</t></is></c></row>', LAUGHS),
      ),
    words: DECLARES,
  },
  {
    name: 'an entity that names a file of the server',
    make: () =>
      packed([
        part(
          'xl/workbook.xml',
          `<!DOCTYPE w [<!ENTITY x SYSTEM "file:///etc/hosts">]>${bookXml(['&x;'])}`,
        ),
        part('xl/_rels/workbook.xml.rels', relationsXml(1)),
        part(SHEET, sheetXml(GOOD_ROWS)),
      ]),
    words: DECLARES,
  },
  {
    name: 'a value in the last row there can be',
    make: () => workbook(sheetXml('<row r="1048576"><c r="A1048576"><v>1</v></c></row>')),
    words: ROWS,
  },
  {
    name: 'a value in row two thousand million',
    make: () => workbook(sheetXml('<row r="2000000000"><c r="A1"><v>1</v></c></row>')),
    words: ROWS,
  },
  {
    name: 'a value in the last column there can be',
    make: () => workbook(sheetXml('<row r="1"><c r="XFD1"><v>1</v></c></row>')),
    words: ROWS,
  },
  {
    name: 'a hundred thousand rows',
    make: () =>
      workbook(sheetXml('<row><c><v>0.8423</v></c><c><v>0.8440</v></c></row>'.repeat(100_000))),
    words: ROWS,
  },
  {
    name: 'a million cells without anything in them',
    make: () =>
      workbook({
        name: SHEET,
        packed: repeated('<c/>'.repeat(10_000), 100, '<worksheet><sheetData><row>'),
        stated: 4_000_000,
      }),
    words: MANY_TAGS,
  },
  {
    name: 'strings nested a hundred thousand deep',
    make: () => workbook(sheetXml(cellOf(0)), [strings('<si><r>'.repeat(100_000))]),
    words: 'nested more than 64 deep',
  },
  {
    name: 'a million strings',
    make: () => workbook(sheetXml(cellOf(0)), [strings('<si/>'.repeat(1_000_000))]),
    words: MANY_TAGS,
  },
  {
    name: 'one string of fifteen megabytes',
    make: () =>
      workbook(sheetXml(cellOf(0)), [strings(`<si><t>${'x'.repeat(15_000_000)}</t></si>`)]),
    words: 'A cell holds more than 2,000 characters',
  },
  {
    name: 'that string in every cell there may be',
    make: () =>
      workbook(
        sheetXml(
          Array.from(
            { length: 400 },
            (_, row) => `<row r="${row + 1}">${'<c t="s"><v>0</v></c>'.repeat(100)}</row>`,
          ).join(''),
        ),
        [strings(`<si><t>${'x'.repeat(15_000_000)}</t></si>`)],
      ),
    words: 'A cell holds more than 2,000 characters',
  },
  {
    name: 'one cell of fifteen megabytes',
    make: () =>
      workbook(
        sheetXml(
          `<row r="1"><c r="A1" t="inlineStr"><is><t>${'x'.repeat(15_000_000)}</t></is></c></row>`,
        ),
      ),
    words: 'A cell holds more than 2,000 characters',
  },
  {
    name: 'a number of fifteen million digits',
    make: () =>
      workbook(sheetXml(`<row r="1"><c r="A1"><v>${'9'.repeat(15_000_000)}</v></c></row>`)),
    words: 'A cell holds more than 2,000 characters',
  },
  {
    name: 'a tag of fifteen megabytes',
    make: () => workbook(sheetXml(`<row r="1" x="${' '.repeat(15_000_000)}"/>`)),
    words: 'cannot be read',
  },
  {
    name: 'a comment that never ends',
    make: () => workbook(sheetXml(`<!-- ${'<!-- '.repeat(500_000)}`)),
    words: 'cannot be read',
  },
  {
    name: 'a million cell formats',
    make: () =>
      workbook(sheetXml(GOOD_ROWS), [
        part(
          'xl/styles.xml',
          `<styleSheet><cellXfs>${'<xf/>'.repeat(1_000_000)}</cellXfs></styleSheet>`,
        ),
      ]),
    words: MANY_TAGS,
  },
  {
    name: 'a column of columns without end',
    make: () =>
      workbook(
        `<worksheet><cols><col min="1" max="2000000000" hidden="1"/></cols><sheetData>${GOOD_ROWS}</sheetData></worksheet>`,
      ),
  },
];

const GOOD_CSV = 'Position,Lifter\n3 intake,0.8423\n';

const TEXT: readonly HostileSheet[] = [
  {
    name: 'a million columns',
    make: () => utf8(`Position${','.repeat(1_000_000)}\n`),
    words: 'more than 100 columns',
  },
  {
    name: 'a thousand columns in a thousand rows',
    make: () => utf8(`${'1,'.repeat(900)}\n`.repeat(1_000)),
    words: 'more than 100 columns',
  },
  {
    name: 'a million rows',
    make: () => utf8('3 intake,0.84\n'.repeat(140_000)),
    words: 'more than 2000 rows',
  },
  { name: 'two million line ends', make: () => utf8('\n'.repeat(1_999_999)), words: 'is empty' },
  {
    name: 'two million line ends and a word',
    make: () => utf8(`${'\n'.repeat(1_999_000)}x`),
    words: 'more than 2000 rows',
  },
  {
    name: 'a quotation mark that is never closed',
    make: () => utf8(`${GOOD_CSV}"${'x\n'.repeat(900_000)}`),
    words: 'a quotation mark is open',
  },
  {
    name: 'a cell of a hundred thousand characters',
    make: () => utf8(`${GOOD_CSV}4 intake,${'9'.repeat(100_000)}\n`),
    words: 'A cell holds more than 2000 characters',
  },
  {
    name: 'nothing but quotation marks',
    make: () => utf8('"'.repeat(1_999_999)),
    words: 'a quotation mark is open',
  },
  { name: 'noughts among the text', make: () => utf8(`${GOOD_CSV}\u0000`), words: 'no CSV file' },
  {
    name: 'UTF-16 without its mark',
    make: () => Buffer.from(GOOD_CSV.repeat(500), 'utf16le'),
    words: 'UTF-16 text without its mark',
  },
  {
    name: 'cells that make patterns look back and back',
    make: () =>
      utf8(
        `Position,Lifter,Bore\n${`3 intake,1,${' '.repeat(900)}x,"1,1${' '.repeat(900)}1"\n`.repeat(1_000)}`,
      ),
  },
];

const DISGUISED: readonly HostileSheet[] = [
  {
    name: 'a Windows program named .csv',
    make: () => Buffer.concat([Buffer.from('MZ\u0090\u0000', 'latin1'), Buffer.alloc(4_000, 1)]),
    words: 'this is a program',
  },
  {
    name: 'a Linux program named .xlsx',
    make: () => Buffer.concat([Buffer.from('\u007fELF', 'latin1'), Buffer.alloc(4_000, 1)]),
    words: 'this is a program',
  },
  {
    name: 'a program with a workbook behind it',
    make: () => Buffer.concat([Buffer.from('MZ', 'latin1'), workbook(sheetXml(GOOD_ROWS))]),
    words: 'this is a program',
  },
  {
    name: 'a web page named .csv',
    make: () => utf8('<!doctype html><script>alert(1)</script>'),
    words: 'a web page or drawing',
  },
  {
    name: 'a drawing named .xlsx',
    make: () => utf8('<svg xmlns="http://www.w3.org/2000/svg" onload="alert(1)"/>'),
    words: 'a web page or drawing',
  },
  {
    name: 'a web page with a workbook behind it',
    make: () => Buffer.concat([utf8('<html><!--'), workbook(sheetXml(GOOD_ROWS)), utf8('-->')]),
    words: 'a web page or drawing',
  },
  { name: 'a document named .csv', make: () => utf8('%PDF-1.7\n1 0 obj'), words: 'a PDF document' },
  {
    name: 'a document with a workbook behind it',
    make: () => Buffer.concat([utf8('%PDF-1.7\n'), workbook(sheetXml(GOOD_ROWS))]),
    words: 'a PDF document',
  },
  {
    name: 'a picture with a workbook behind it',
    make: () => Buffer.concat([utf8('GIF89a'), workbook(sheetXml(GOOD_ROWS))]),
    words: 'a GIF picture',
  },
  {
    name: 'a workbook behind something else',
    make: () => Buffer.concat([utf8('Position,Lifter\n'), workbook(sheetXml(GOOD_ROWS))]),
    words: 'no CSV file',
  },
  {
    name: 'a spreadsheet of the old binary form',
    make: () =>
      Buffer.concat([
        Buffer.from([0xd0, 0xcf, 0x11, 0xe0, 0xa1, 0xb1, 0x1a, 0xe1]),
        Buffer.alloc(2_000),
      ]),
    words: 'the old binary form',
  },
  {
    name: 'a packed stream named .csv',
    make: () => gzipSync(Buffer.alloc(50_000_000)),
    words: 'no CSV file',
  },
];

export const HOSTILE_SHEETS: readonly HostileSheet[] = [...PACKED, ...XML, ...TEXT, ...DISGUISED];
