import { readFile } from 'node:fs/promises';
import { createRequire } from 'node:module';
import fontkit, { type Font } from '@pdf-lib/fontkit';
import type { Color, PDFDocument, PDFFont, PDFPage } from 'pdf-lib';

import { unpackWoff } from './unpack-woff';

/** Faces of the printed sheet; sizes and places are in CSS pixels, as the sheet was drawn. */
export type Face = 'text' | 'bold' | 'head' | 'num' | 'num-bold';

export interface Style {
  readonly face: Face;
  readonly size: number;
  readonly white?: boolean;
}

const barlow = (cut: number) => [
  `barlow/files/barlow-latin-${cut}-normal.woff`,
  `barlow/files/barlow-latin-ext-${cut}-normal.woff`,
];

const condensed = ['latin', 'latin-ext'].map(
  (part) => `barlow-semi-condensed/files/barlow-semi-condensed-${part}-600-normal.woff`,
);

// WOFF, since the subsetter cannot take WOFF2's transformed outlines apart. B612 is Latin only: what
// it lacks is set in Barlow.
const FILES: { readonly [F in Face]: readonly string[] } = {
  text: barlow(500),
  bold: barlow(600),
  head: condensed,
  num: ['b612/files/b612-latin-400-normal.woff', ...barlow(500)],
  'num-bold': ['b612/files/b612-latin-700-normal.woff', ...barlow(600)],
};

const WIDE_PARTS = ['latin-ext', 'vietnamese', 'cyrillic', 'cyrillic-ext', 'greek', 'greek-ext'];
const WIDE_WEIGHTS: { readonly [F in Face]: number } = {
  text: 500,
  bold: 600,
  head: 600,
  num: 500,
  'num-bold': 600,
};

const wide = (part: string, weight: number): string =>
  `noto-sans/files/noto-sans-${part}-${weight}-normal.woff`;

interface Cut {
  readonly outlines: Font;
  readonly embedded: PDFFont;
}

interface Glyph {
  readonly font: PDFFont;
  readonly shown: string;
  /** At size 1. */
  readonly width: number;
}

interface Run {
  readonly font: PDFFont;
  text: string;
  width: number;
}

/** What stands for a character that no face has: B612 and Barlow share it. */
const BOX = '¤';

const cuts = new Map<string, Promise<Uint8Array>>();
const require = createRequire(import.meta.url);

const load = (file: string): Promise<Uint8Array> => {
  const known = cuts.get(file) ?? readFile(require.resolve(`@fontsource/${file}`)).then(unpackWoff);
  cuts.set(file, known);
  return known;
};

/** Parts of the wide face that hold letters of the texts which none of the sheet's own faces has. */
const findWideParts = async (
  letters: Iterable<string>,
  own: readonly Font[],
): Promise<readonly string[]> => {
  const lacking = [...letters]
    .map((letter) => letter.codePointAt(0) ?? 0)
    .filter((code) => !own.some((outlines) => outlines.hasGlyphForCodePoint(code)));
  if (lacking.length === 0) return [];
  const parts: string[] = [];
  for (const part of WIDE_PARTS) {
    const outlines = fontkit.create(await load(wide(part, 500)));
    if (lacking.some((code) => outlines.hasGlyphForCodePoint(code))) parts.push(part);
  }
  return parts;
};

export interface Typesetter {
  /** Whether every letter can be set; what cannot stands as ¤. */
  readonly covers: (text: string) => boolean;
  readonly width: (text: string, style: Style) => number;
  /** Draws on a baseline, in the page's own points. */
  readonly draw: (page: PDFPage, text: string, at: Placed) => void;
}

export interface Placed {
  readonly x: number;
  readonly y: number;
  readonly style: Style;
  readonly scale: number;
  readonly ink: Color;
}

/**
 * Faces embedded into one document, each subset to what is drawn. `texts` holds every letter that may be
 * drawn: the wide face, with Greek and Cyrillic, is embedded only where one of them asks for it.
 */
export const openTypefaces = async (document: PDFDocument, texts: string): Promise<Typesetter> => {
  document.registerFontkit(fontkit);
  const opened = new Map<string, Cut>();
  const open = async (file: string) => {
    const bytes = await load(file);
    const embedded = await document.embedFont(bytes, {
      subset: true,
      // Figures of one width; no ligatures and no letters taken apart, so that the text can be
      // searched letter by letter.
      features: { tnum: true, liga: false, ccmp: false },
    });
    opened.set(file, { outlines: fontkit.create(bytes), embedded });
  };
  for (const file of new Set(Object.values(FILES).flat())) await open(file);
  const own = FILES.text.flatMap((file) => opened.get(file)?.outlines ?? []);
  const parts = await findWideParts(new Set(texts.normalize('NFC')), own);
  for (const part of parts) for (const weight of [500, 600]) await open(wide(part, weight));
  const cutsOf = (face: Face) =>
    [...FILES[face], ...parts.map((part) => wide(part, WIDE_WEIGHTS[face]))].flatMap(
      (file) => opened.get(file) ?? [],
    );
  const find = (letter: string, face: Face): Cut | undefined =>
    cutsOf(face).find(({ outlines }) => outlines.hasGlyphForCodePoint(letter.codePointAt(0) ?? 0));

  const glyphs = new Map<string, Glyph>();
  /** Letters are measured one by one and kept: the writer sets them without kerning. */
  const glyphOf = (letter: string, face: Face): Glyph => {
    const key = `${face}${letter}`;
    const known = glyphs.get(key);
    if (known !== undefined) return known;
    const cut = find(letter, face);
    const font = (cut ?? find(BOX, face))?.embedded;
    if (font === undefined) throw new Error('The print’s faces lack their own sign.');
    const shown = cut === undefined ? BOX : letter;
    const glyph = { font, shown, width: font.widthOfTextAtSize(shown, 1000) / 1000 };
    glyphs.set(key, glyph);
    return glyph;
  };

  /** The text cut where the font changes. */
  const runs = (text: string, face: Face): readonly Run[] => {
    const parts: Run[] = [];
    for (const letter of text.normalize('NFC')) {
      const { font, shown, width } = glyphOf(letter, face);
      const last = parts.at(-1);
      if (last?.font === font) {
        last.text += shown;
        last.width += width;
      } else parts.push({ font, text: shown, width });
    }
    return parts;
  };

  return {
    covers: (text) =>
      [...text.normalize('NFC')].every((letter) => find(letter, 'text') !== undefined),
    width: (text, { face, size }) =>
      runs(text, face).reduce((sum, run) => sum + run.width * size, 0),
    draw: (page, text, { x, y, style, scale, ink }) => {
      let at = x;
      for (const run of runs(text, style.face)) {
        const size = style.size * scale;
        page.drawText(run.text, { x: at, y, size, font: run.font, color: ink });
        at += run.width * size;
      }
    },
  };
};
