/** How a CSV file is written, so that it can be written back the same way. */
export interface CsvForm {
  readonly encoding: 'utf-8' | 'utf-16le' | 'utf-16be' | 'windows-1252';
  readonly mark: boolean;
  readonly delimiter: string;
  /** A first line `sep=;` that says the delimiter outright. */
  readonly stated: boolean;
  readonly newline: '\r\n' | '\n' | '\r';
}

const DELIMITERS = [',', ';', '\t', '|'] as const;
const LOOKED_AT = 64_000;

export const encodingOf = (bytes: Uint8Array): Pick<CsvForm, 'encoding' | 'mark'> => {
  const [a, b, c] = bytes;
  if (a === 0xff && b === 0xfe) return { encoding: 'utf-16le', mark: true };
  if (a === 0xfe && b === 0xff) return { encoding: 'utf-16be', mark: true };
  if (a === 0xef && b === 0xbb && c === 0xbf) return { encoding: 'utf-8', mark: true };
  try {
    new TextDecoder('utf-8', { fatal: true }).decode(bytes);
    return { encoding: 'utf-8', mark: false };
  } catch {
    return { encoding: 'windows-1252', mark: false };
  }
};

/** The mark that stands most evenly in the lines; a first line `sep=;` says it outright. */
export const delimiterOf = (
  text: string,
): { readonly delimiter: string; readonly body: string } => {
  const stated = /^sep=(.)\r?\n/i.exec(text);
  if (stated?.[1] !== undefined)
    return { delimiter: stated[1], body: text.slice(stated[0].length) };
  const lines = text
    .slice(0, LOOKED_AT)
    .split(/\r?\n|\r/, 500)
    .filter((line) => line.trim() !== '')
    .slice(0, 50);
  const score = (delimiter: string): number => {
    const counts = lines.map((line) => line.split(delimiter).length - 1).toSorted((a, b) => a - b);
    return counts[Math.floor(counts.length / 2)] ?? 0;
  };
  // Decimal commas are many: a semicolon, a tab or a bar that stands in most lines goes before them.
  const others = DELIMITERS.filter((delimiter) => delimiter !== ',' && score(delimiter) > 0);
  const [best = ','] = others.toSorted((a, b) => score(b) - score(a));
  return { delimiter: best, body: text };
};

export const newlineOf = (text: string): CsvForm['newline'] => {
  const found = /\r\n|\n|\r/.exec(text.slice(0, LOOKED_AT))?.[0];
  return found === '\r\n' || found === '\r' ? found : '\n';
};
