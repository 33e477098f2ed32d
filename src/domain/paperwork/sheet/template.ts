import { getUnit } from '../../quantity/find-unit';
import { getQuantityEntry } from '../../rulebook/quantity-catalogue';
import { rowsFor } from './positions';
import type { WantedSheet } from './sheet-cell';

const IN_MILLIMETRES: Readonly<Record<string, string>> = { in: 'mm', 'in²': 'mm²', 'in³': 'cc' };

/** Rows of text to fill in: a heading with units, and a row for every place on this engine. */
export const templateRows = (
  { form, layout }: WantedSheet,
  system: 'inch' | 'metric' = 'inch',
): readonly (readonly string[])[] => {
  const headings = form.columns.map(({ quantity, label, unit }) => {
    const chosen = system === 'metric' ? (IN_MILLIMETRES[unit] ?? unit) : unit;
    const { symbol } = getUnit(getQuantityEntry(quantity).dimension, chosen);
    return symbol === '1' ? label : `${label} (${symbol})`;
  });
  const first = form.per === 'cylinder' ? 'Cylinder' : 'Position';
  return [
    [first, ...headings],
    ...rowsFor(form.per, layout).map((place) => [place.key, ...headings.map(() => '')]),
  ];
};

const quoted = (cell: string): string =>
  /[",\r\n]/.test(cell) ? `"${cell.replaceAll('"', '""')}"` : cell;

/** RFC 4180, with the mark by which spreadsheets recognise UTF-8. */
export const csvText = (rows: readonly (readonly string[])[]): string =>
  `\uFEFF${rows.map((row) => row.map(quoted).join(',')).join('\r\n')}\r\n`;
