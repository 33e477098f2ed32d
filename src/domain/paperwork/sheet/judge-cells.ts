import { asciiIn } from '../../quantity/format';
import { decimalsOf } from '../../quantity/number-text';
import { parseQuantity } from '../../quantity/parse';
import type { Quantity } from '../../quantity/quantity';
import { toNumber } from '../../quantity/rational';
import type { RuleDimension } from '../../rulebook/quantities/entry';
import { getQuantityEntry } from '../../rulebook/quantity-catalogue';
import { lobeOf } from '../cam/cam-place';
import { offTheCurve } from '../cam/off-the-curve';
import { implausible, type Seen } from './plausible';
import { placeKey, type SheetCell } from './sheet-cell';

/** `faulty`: no number; `questioned`: a number that is hardly meant. Both are kept as written. */
export interface JudgedCell {
  readonly cell: SheetCell;
  readonly state: 'ok' | 'faulty' | 'questioned';
  readonly quantity?: Quantity<RuleDimension> | undefined;
  /** What is wrong, with the place, in one or two sentences. */
  readonly detail?: string | undefined;
  /** What to do about it, in one sentence. */
  readonly remedy?: string | undefined;
}

const SHORT: Readonly<Record<string, string>> = {
  'lifter-body-diameter': 'lifter',
  'foot-diameter': 'foot',
  'tappet-bore-diameter': 'bore',
};

/** `3 intake, bore above across`; of a cam table `110 deg, intake lobe lift`. */
export const cellWords = (cell: SheetCell): string => {
  const label = SHORT[cell.quantity] ?? getQuantityEntry(cell.quantity).label.toLowerCase();
  const lobe = lobeOf(cell);
  if (lobe !== undefined) return `${cell.position} deg, ${lobe} ${label}`;
  const place = [label, cell.depth, cell.axis].filter((part) => part !== '').join(' ');
  return `${cell.position === 'engine' ? 'Engine' : cell.position}, ${place}`;
};

const read = (cell: SheetCell) =>
  parseQuantity(cell.typed, {
    dimension: getQuantityEntry(cell.quantity).dimension,
    defaultUnit: cell.unit,
  });

/** As spreadsheets write the day they made of `8.44` or `3/4`. */
const DATE =
  /^(\d{4}-\d{2}-\d{2}|(?:0?[1-9]|[12]\d|3[01])[./-](?:0?[1-9]|[12]\d|3[01])[./-](?:\d{4}|\d{2}))$/;

const NO_NUMBER: Readonly<Record<'date' | 'error' | 'other', readonly [string, string]>> = {
  date: [
    'is a date',
    'The spreadsheet made a date of what was typed: type the number here, or set the cell to “text” there.',
  ],
  error: [
    'is no number',
    'The formula in this cell failed: type the number here, or correct it in the file.',
  ],
  other: ['is no number', 'Write one number with one decimal mark, such as 0.8441.'],
};

const faulty = (cell: SheetCell, fault: { name: string; detail: string }): JudgedCell => {
  const typed = cell.typed.trim();
  const kind = DATE.test(typed) ? 'date' : typed.startsWith('#') ? 'error' : 'other';
  // “0.84O1” is a number with a slip in it, not one in the unit O1.
  const isNone =
    fault.name === 'not-a-number' ||
    kind !== 'other' ||
    /\d\D+\d$/.test(typed.replace(/[.,]/g, ''));
  const [words, remedy] = NO_NUMBER[kind];
  const detail = `${cellWords(cell)}: ${isNone ? `“${cell.typed}” ${words}.` : fault.detail} Kept as written.`;
  return {
    cell,
    state: 'faulty',
    detail,
    remedy: isNone ? remedy : 'Correct it here or in the file.',
  };
};

/** With the decimals it was written with. */
const shown = (quantity: Quantity): string =>
  `${asciiIn(quantity, quantity.unit, decimalsOf(quantity.text)).replace('-', '−')} ${quantity.unit}`;

/**
 * Every cell of a sheet: read, and weighed against the others. A cell that somebody stands by is
 * questioned no more; blanks are no cells.
 */
export const judgeCells = (cells: readonly SheetCell[]): readonly JudgedCell[] => {
  const written = cells.filter((cell) => cell.typed.trim() !== '');
  const seen = written.flatMap((cell): Seen[] => {
    const parsed = read(cell);
    return parsed.ok
      ? [{ cell, quantity: parsed.value, number: toNumber(parsed.value.value) }]
      : [];
  });
  const questions = new Map(
    [
      ...implausible(
        seen.filter(({ cell }) => lobeOf(cell) === undefined),
        shown,
      ),
      ...offTheCurve(seen, shown),
    ].map(({ cell, detail }) => [placeKey(cell), detail]),
  );
  return written.map((cell): JudgedCell => {
    const parsed = read(cell);
    if (!parsed.ok) return faulty(cell, parsed.failure);
    const detail = cell.confirmed === true ? undefined : questions.get(placeKey(cell));
    return detail === undefined
      ? { cell, state: 'ok', quantity: parsed.value }
      : {
          cell,
          state: 'questioned',
          quantity: parsed.value,
          detail: `${cellWords(cell)}: ${detail}`,
          remedy: 'Correct it, or say that it is so.',
        };
  });
};
