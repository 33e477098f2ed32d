import { type Pen, SHEET } from './pen';
import type { Style } from './typeface/typeface';

/** A piece of the sheet that never breaks over a page. */
export interface Block {
  readonly height: number;
  readonly draw: (pen: Pen, top: number) => void;
  /** Drawn again on top of the page where the block opens one: a table's head. */
  readonly head?: Block;
}

export const TEXT: Style = { face: 'text', size: 14.5 };
export const BOLD: Style = { face: 'bold', size: 14.5 };
export const HEAD: Style = { face: 'head', size: 14.5 };
export const NUM: Style = { face: 'num', size: 14.5 };
export const LINE = 20;

export interface Span {
  readonly text: string;
  readonly style: Style;
}

type Width = (text: string, style: Style) => number;

/** Words with what clings to them: pieces of several styles without a space between. */
const wordsOf = (spans: readonly Span[]): readonly (readonly Span[])[] => {
  const words: Span[][] = [];
  let open = false;
  for (const { text, style } of spans) {
    for (const part of text.split(/(\s+)/)) {
      if (part === '') continue;
      if (/^\s+$/.test(part)) open = false;
      else if (open) words.at(-1)?.push({ text: part, style });
      else {
        words.push([{ text: part, style }]);
        open = true;
      }
    }
  }
  return words;
};

/** Letters that fill a line where a single word is wider than it. */
const broken = (
  word: readonly Span[],
  room: number,
  width: Width,
): readonly (readonly Span[])[] => {
  const pieces: Span[][] = [[]];
  let used = 0;
  for (const { text, style } of word) {
    for (const letter of text) {
      const wide = width(letter, style);
      if (used + wide > room) {
        pieces.push([]);
        used = 0;
      }
      pieces.at(-1)?.push({ text: letter, style });
      used += wide;
    }
  }
  return pieces;
};

/** Lines that fit into `room` pixels. */
export const wrap = (
  spans: readonly Span[],
  room: number,
  width: Width,
): readonly (readonly Span[])[] => {
  const wide = (word: readonly Span[]) =>
    word.reduce((sum, { text, style }) => sum + width(text, style), 0);
  const lines: Span[][] = [[]];
  let used = 0;
  for (const word of wordsOf(spans).flatMap((word) =>
    wide(word) > room ? broken(word, room, width) : [word],
  )) {
    const style = word[0]?.style ?? TEXT;
    const space = used === 0 ? 0 : width(' ', style);
    if (used > 0 && used + space + wide(word) > room) {
      lines.push([...word]);
      used = wide(word);
    } else {
      lines.at(-1)?.push(...(used === 0 ? word : [{ text: ' ', style }, ...word]));
      used += space + wide(word);
    }
  }
  return lines;
};

/** One block a line, so that a long text runs on over the page. */
export const paragraph = (
  spans: readonly Span[],
  width: Width,
  {
    line = LINE,
    left = SHEET.content,
    right = SHEET.right,
  }: { line?: number; left?: number; right?: number } = {},
): readonly Block[] =>
  wrap(spans, right - left, width).map((pieces) => ({
    height: line,
    draw: (pen, top) => {
      let x = left;
      for (const { text, style } of pieces) {
        pen.text(x, top + line * 0.72, text, style);
        x += pen.width(text, style);
      }
    },
  }));

export const gap = (height: number): Block => ({ height, draw: () => undefined });
