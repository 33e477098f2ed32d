import { type Failure, failure } from '@/domain/failure';
import { MOST_CELL, MOST_SPENT, type Spent } from '../spent';

/** One tag of an XML text, by where it stands in it. */
export interface Tag {
  /** Without its namespace's prefix. */
  readonly name: string;
  readonly kind: 'open' | 'close' | 'empty';
  /** Of `<`. */
  readonly from: number;
  /** Behind `>`. */
  readonly to: number;
}

const MOST_DEPTH = 64;
const LONGEST_TAG = 20_000;
/** Spreadsheets keep at most 32,767 characters in a cell; entities may be longer than what they stand for. */
const LONGEST_TEXT = 200_000;

const WORDS = {
  declares:
    'This XLSX file declares entities of its own, which no spreadsheet program writes. Save the sheet once more, or save it as CSV.',
  deep: `The parts of this XLSX file are nested more than ${MOST_DEPTH} deep. Save the sheet once more, or save it as CSV.`,
  many: `This XLSX file holds more than ${MOST_SPENT.tags.toLocaleString('en')} elements; a measurement sheet has a few hundred. Save only the sheet itself, or save it as CSV.`,
  long: `A cell holds more than ${MOST_CELL.toLocaleString('en')} characters. Save only the measurement sheet.`,
  broken: 'This XLSX file cannot be read. Save the sheet once more, or save it as CSV.',
} as const;

/** An attribute's value as it stands, entities and all; nothing where the tag has none of that name. */
export const attributeOf = (xml: string, tag: Tag, name: string): string | undefined =>
  new RegExp(`[\\s:]${name}\\s*=\\s*(?:"([^"]*)"|'([^']*)')`)
    .exec(xml.slice(tag.from, tag.to))
    ?.slice(1)
    .find((value) => value !== undefined);

/** Behind the `>` that ends a tag; one within quotation marks ends nothing. */
const endOf = (xml: string, from: number): number => {
  let quote = '';
  const last = Math.min(xml.length, from + LONGEST_TAG);
  for (let at = from; at < last; at += 1) {
    const char = xml[at];
    if (quote !== '') quote = char === quote ? '' : quote;
    else if (char === '"' || char === "'") quote = char;
    else if (char === '>') return at + 1;
  }
  return -1;
};

const nameAt = (xml: string, from: number): string =>
  /^[^\s/>]*/
    .exec(xml.slice(from, from + 100))?.[0]
    .split(':')
    .at(-1) ?? '';

/**
 * Goes through the tags of an XML text in one pass, without building anything of it. Text that declares
 * entities, nests too deep or has too many tags is refused before a parser sees it.
 */
export const scanTags = (
  xml: string,
  spent: Spent,
  visit: (tag: Tag) => Failure | undefined,
): Failure | undefined => {
  const refuse = (why: keyof typeof WORDS): Failure =>
    failure(why === 'many' || why === 'deep' ? 'too-large' : 'damaged-file', WORDS[why]);
  let depth = 0;
  let behind = 0;
  for (let at = xml.indexOf('<'); at >= 0; at = xml.indexOf('<', at)) {
    spent.tags += 1;
    if (spent.tags > MOST_SPENT.tags) return refuse('many');
    if (at - behind > LONGEST_TEXT) return refuse('long');
    const next = xml[at + 1];
    if (next === '!' || next === '?') {
      const ends = xml.startsWith('<!--', at)
        ? '-->'
        : xml.startsWith('<![CDATA[', at)
          ? ']]>'
          : next === '?'
            ? '?>'
            : undefined;
      if (ends === undefined) return refuse('declares');
      const end = xml.indexOf(ends, at);
      if (end < 0) return refuse('broken');
      at = end + ends.length;
      behind = at;
      continue;
    }
    const to = endOf(xml, at);
    if (to < 0) return refuse('broken');
    const closes = next === '/';
    const kind = closes ? 'close' : xml[to - 2] === '/' ? 'empty' : 'open';
    if (kind === 'open') depth += 1;
    if (kind === 'close') depth -= 1;
    if (depth > MOST_DEPTH) return refuse('deep');
    if (depth < 0) return refuse('broken');
    const refused = visit({ name: nameAt(xml, at + (closes ? 2 : 1)), kind, from: at, to });
    if (refused !== undefined) return refused;
    at = to;
    behind = to;
  }
  return depth === 0 ? undefined : refuse('broken');
};
