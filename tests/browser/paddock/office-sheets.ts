import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';

/** One reading of a sheet, as whoever described the sheet wrote it down: no reader of ours had a part in it. */
export interface ExpectedCell {
  readonly cell: string;
  readonly position: string;
  readonly quantity: string;
  /** With its unit; absent where the cell holds no number. */
  readonly value?: string;
  readonly detail?: string;
}

interface ExpectedSheet {
  readonly what: string;
  /** Headings that a person has to explain; an empty quantity for nothing of this sheet. */
  readonly columns: Readonly<Record<string, { readonly quantity: string; readonly unit: string }>>;
  readonly notes: readonly string[];
  readonly cells: readonly ExpectedCell[];
}

const folder = new URL('../../fixtures/office/', import.meta.url);

/** The file itself, as LibreOffice wrote it. */
export const officePath = (file: string): string => fileURLToPath(new URL(file, folder));

const all: Readonly<Record<string, ExpectedSheet>> = JSON.parse(
  readFileSync(officePath('expected.json'), 'utf8'),
);

export const OFFICE_FILES: readonly string[] = Object.keys(all);

export const expectedOf = (file: string): ExpectedSheet => {
  const sheet = all[file];
  if (sheet === undefined) throw new Error(`Nothing is expected of ${file}.`);
  return sheet;
};

const WRITTEN = /^\s*([\d.,]+)(?:[eE]([+-]?\d+))?\s*(in|mm|\u03bcm)?\s*$/;

/**
 * A number with its unit in 10⁻¹² of it, so that two ways of writing one are one text. A comma sets
 * thousands apart where there is a point too, else it is the decimal mark.
 */
export const exactly = (typed: string, unit: string): string => {
  // NFKC makes one of the two signs for micro, and of a no-break space a space.
  const [, digits, exponent = '0', own = unit.normalize('NFKC')] =
    WRITTEN.exec(typed.normalize('NFKC')) ?? [];
  if (digits === undefined) return `no number: ${typed}`;
  const number = digits.includes('.') ? digits.replaceAll(',', '') : digits.replace(',', '.');
  const [whole = '', part = ''] = number.split('.');
  const places = 12 + Number(exponent) - part.length;
  return `${BigInt(`${whole}${part}`) * 10n ** BigInt(places)} ${own}`;
};

/** `21.392 mm` likewise. */
export const exactlyOf = (value: string): string => {
  const [typed = '', unit = ''] = value.split(' ');
  return exactly(typed, unit);
};

/** As a person reads where a value came from: `row 4, column C of german.csv`. */
export const placeIn = (cell: string, file: string): string => {
  const [, sheet, column, row] = /^(?:(.*)!)?([A-Z]+)(\d+)$/.exec(cell) ?? [];
  return `row ${row}, column ${column} of ${sheet === undefined ? file : `“${sheet}” in ${file}`}`;
};
