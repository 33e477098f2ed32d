import { inflateSync } from 'node:zlib';

/** What a reader's eye finds in one of our PDFs: text in drawing order, and the attached files. */
export interface PdfContent {
  readonly text: string;
  readonly attachments: Readonly<Record<string, string>>;
  readonly pages: number;
}

interface Stream {
  readonly dictionary: string;
  readonly bytes: Buffer;
}

const latin = (bytes: Uint8Array): string => Buffer.from(bytes).toString('latin1');

/** Every indirect object with its stream, if it has one, decompressed. */
const objectsOf = (pdf: string): ReadonlyMap<string, Stream> => {
  const found = new Map<string, Stream>();
  for (const match of pdf.matchAll(/(\d+) 0 obj\s*([\s\S]*?)endobj/g)) {
    const [, id = '', body = ''] = match;
    const at = body.search(/stream\r?\n/);
    if (at < 0) {
      found.set(id, { dictionary: body, bytes: Buffer.alloc(0) });
      continue;
    }
    const dictionary = body.slice(0, at);
    const start = at + (body.slice(at).match(/^stream\r?\n/)?.[0].length ?? 0);
    const length = Number(/\/Length (\d+)/.exec(dictionary)?.[1]);
    const raw = Buffer.from(body.slice(start, start + length), 'latin1');
    const bytes = dictionary.includes('/FlateDecode') ? inflateSync(raw) : raw;
    found.set(id, { dictionary, bytes });
  }
  return found;
};

/** Glyph number → letters, from a font's ToUnicode map. */
const mapOf = (cmap: string): ReadonlyMap<string, string> => {
  const map = new Map<string, string>();
  const letters = (hex: string) =>
    (hex.match(/.{4}/g) ?? [])
      .map((unit) => String.fromCharCode(Number.parseInt(unit, 16)))
      .join('');
  for (const block of cmap.matchAll(/beginbfchar([\s\S]*?)endbfchar/g)) {
    for (const pair of (block[1] ?? '').matchAll(/<([0-9a-f]+)>\s*<([0-9a-f]+)>/gi)) {
      map.set((pair[1] ?? '').toLowerCase(), letters(pair[2] ?? ''));
    }
  }
  return map;
};

/** Reads an unencrypted PDF whose objects stand plainly in the file and whose text is set by glyph number. */
export const readPdf = (file: Uint8Array): PdfContent => {
  const objects = objectsOf(latin(file));
  const all = [...objects.values()];
  const fonts = new Map<string, ReadonlyMap<string, string>>();
  for (const { dictionary } of all) {
    for (const [, block = ''] of dictionary.matchAll(/\/Font\s*<<([\s\S]*?)>>/g)) {
      for (const [, name = '', id = ''] of block.matchAll(/\/(\S+) (\d+) 0 R/g)) {
        const unicode = /\/ToUnicode (\d+) 0 R/.exec(objects.get(id)?.dictionary ?? '')?.[1];
        if (unicode !== undefined)
          fonts.set(name, mapOf(latin(objects.get(unicode)?.bytes ?? new Uint8Array())));
      }
    }
  }
  const lines: string[] = [];
  for (const { bytes } of all) {
    const content = latin(bytes);
    if (!/\bBT\b[\s\S]*\bTj\b/.test(content)) continue;
    let last = '';
    for (const [, font = '', place = '', glyphs = ''] of content.matchAll(
      /\/(\S+) [\d.]+ Tf[\s\S]*?([-\d.]+) Tm\s*<([0-9A-Fa-f]*)> Tj/g,
    )) {
      const map = fonts.get(font);
      const text = (glyphs.match(/.{4}/g) ?? [])
        .map((glyph) => map?.get(glyph.toLowerCase()) ?? '?')
        .join('');
      if (place === last) lines[lines.length - 1] += text;
      else lines.push(text);
      last = place;
    }
  }
  const attachments: Record<string, string> = {};
  for (const { dictionary } of all) {
    const name = /\/Type \/Filespec[\s\S]*?\/UF <FEFF([0-9A-F]+)>/.exec(dictionary)?.[1];
    const id = /\/EF <<[\s\S]*?\/F (\d+) 0 R/.exec(dictionary)?.[1];
    if (name === undefined || id === undefined) continue;
    const letters = (name.match(/.{4}/g) ?? []).map((unit) =>
      String.fromCharCode(Number.parseInt(unit, 16)),
    );
    attachments[letters.join('')] = objects.get(id)?.bytes.toString('utf8') ?? '';
  }
  return {
    text: lines.join('\n'),
    attachments,
    pages: all.filter(({ dictionary }) => /\/Type \/Page\b(?!s)/.test(dictionary)).length,
  };
};
