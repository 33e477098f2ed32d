import { posix } from 'node:path';
import type { Failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import type { Spent } from '../spent';
import { damagedXlsx, type Package } from './open-package';
import { attributeOf, scanTags, type Tag } from './scan-tags';

export interface WorkbookSheet {
  /** As it stands in the XML, entities and all. */
  readonly rawName: string;
  readonly name: string;
  readonly hidden: boolean;
  /** The part that holds it, `xl/worksheets/sheet1.xml`. */
  readonly part: string;
}

export interface Workbook {
  readonly sheets: readonly WorkbookSheet[];
  /** Days are counted from 1904. */
  readonly from1904: boolean;
  readonly stylesXml: string;
  readonly stringsXml: string;
  /** How numbers are shown, by a cell's style: a format's code, or its number where it is built in. */
  readonly formats: readonly string[];
}

const MOST_SHEETS = 20;

const NAMED: Readonly<Record<string, string>> = {
  lt: '<',
  gt: '>',
  amp: '&',
  quot: '"',
  apos: "'",
};

/** The five entities of XML and numbered characters (XML 1.0, 4.6 and 4.1); others stay as they stand. */
export const unescaped = (text: string): string =>
  text.replace(/&(?:#(\d{1,7})|#x([0-9a-f]{1,6})|(\w{2,4}));/gi, (whole, decimal, hex, name) => {
    if (name !== undefined) return NAMED[name] ?? whole;
    const code = decimal === undefined ? Number.parseInt(hex, 16) : Number(decimal);
    return code > 0x10ffff ? whole : String.fromCodePoint(code);
  });

interface Relation {
  readonly id: string;
  readonly kind: string;
  readonly part: string;
}

const relationOf = (xml: string, tag: Tag): Relation => {
  const target = unescaped(attributeOf(xml, tag, 'Target') ?? '');
  return {
    id: attributeOf(xml, tag, 'Id') ?? '',
    kind: attributeOf(xml, tag, 'Type')?.split('/').at(-1) ?? '',
    part: target.startsWith('/') ? target.slice(1) : posix.normalize(`xl/${target}`),
  };
};

/** Attributes of every element of one name, in their order. */
const collect = <T>(
  xml: string,
  spent: Spent,
  name: string,
  make: (tag: Tag) => T,
): Result<readonly T[], Failure> => {
  const found: T[] = [];
  const refused = scanTags(xml, spent, (tag) => {
    if (tag.name === name && tag.kind !== 'close') found.push(make(tag));
    return undefined;
  });
  return refused === undefined ? ok(found) : fail(refused);
};

const formatsIn = (xml: string, spent: Spent): Result<readonly string[], Failure> => {
  const codes = new Map<string, string>();
  const formats: string[] = [];
  let inCells = false;
  const refused = scanTags(xml, spent, (tag) => {
    if (tag.kind === 'close') {
      if (tag.name === 'cellXfs') inCells = false;
      return undefined;
    }
    const id = () => attributeOf(xml, tag, 'numFmtId') ?? '0';
    if (tag.name === 'cellXfs') inCells = tag.kind === 'open';
    else if (tag.name === 'numFmt')
      codes.set(id(), unescaped(attributeOf(xml, tag, 'formatCode') ?? ''));
    else if (tag.name === 'xf' && inCells) formats.push(codes.get(id()) ?? id());
    return undefined;
  });
  return refused === undefined ? ok(formats) : fail(refused);
};

/** What a workbook says of its sheets and formats; the sheets themselves are not unpacked yet. */
export const readWorkbook = (file: Package, spent: Spent): Result<Workbook, Failure> => {
  const relationsXml = file.read('xl/_rels/workbook.xml.rels');
  const bookXml = file.read('xl/workbook.xml');
  if (!relationsXml.ok) return relationsXml;
  if (!bookXml.ok) return bookXml;
  const relations = collect(relationsXml.value, spent, 'Relationship', (tag) =>
    relationOf(relationsXml.value, tag),
  );
  if (!relations.ok) return relations;
  const partOf = (kind: string) => relations.value.find((one) => one.kind === kind)?.part;
  const book = bookXml.value;
  const sheets = collect(book, spent, 'sheet', (tag) => {
    const rawName = attributeOf(book, tag, 'name') ?? '';
    const relation = relations.value.find((one) => one.id === attributeOf(book, tag, 'id'));
    return {
      rawName,
      name: unescaped(rawName),
      hidden: (attributeOf(book, tag, 'state') ?? 'visible') !== 'visible',
      part: relation?.kind === 'worksheet' ? relation.part : '',
    };
  });
  if (!sheets.ok) return sheets;
  const found = sheets.value.filter(({ part }) => part !== '').slice(0, MOST_SHEETS);
  if (found.length === 0) return damagedXlsx();
  const stylesXml = file.read(partOf('styles') ?? 'xl/styles.xml');
  if (!stylesXml.ok) return stylesXml;
  const formats = formatsIn(stylesXml.value, spent);
  if (!formats.ok) return formats;
  const stringsXml = file.read(partOf('sharedStrings') ?? 'xl/sharedStrings.xml');
  if (!stringsXml.ok) return stringsXml;
  const refused = scanTags(stringsXml.value, spent, () => undefined);
  if (refused !== undefined) return fail(refused);
  return ok({
    sheets: found,
    from1904: /<(?:\w+:)?workbookPr\s[^>]*date1904\s*=\s*["'](?:1|true)["']/.test(book),
    stylesXml: stylesXml.value,
    stringsXml: stringsXml.value,
    formats: formats.value,
  });
};
