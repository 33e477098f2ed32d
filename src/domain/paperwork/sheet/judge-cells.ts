import { asciiIn } from '../../quantity/format';
import { decimalsOf } from '../../quantity/number-text';
import { parseQuantity } from '../../quantity/parse';
import type { Quantity } from '../../quantity/quantity';
import { toNumber } from '../../quantity/rational';
import { getQuantityEntry, type RuleDimension } from '../../rulebook/quantity-catalogue';
import { implausible, type Seen } from './plausible';
import { placeKey, type SheetCell } from './sheet-cell';

/** `faulty`: no number; `questioned`: a number that is hardly meant. Both are kept as written. */
export interface JudgedCell {
  readonly cell: SheetCell;
  readonly state: 'ok' | 'faulty' | 'questioned';
  readonly quantity?: Quantity<RuleDimension> | undefined;
  /** What is wrong, with the place and what to do, in one or two sentences. */
  readonly detail?: string | undefined;
}

const SHORT: Readonly<Record<string, string>> = {
  'lifter-body-diameter': 'lifter',
  'foot-diameter': 'foot',
  'tappet-bore-diameter': 'bore',
};

/** `3 intake, bore above across`. */
export const cellWords = (cell: SheetCell): string => {
  const label = SHORT[cell.quantity] ?? getQuantityEntry(cell.quantity).label.toLowerCase();
  const place = [label, cell.depth, cell.axis].filter((part) => part !== '').join(' ');
  return `${cell.position === 'engine' ? 'Engine' : cell.position}, ${place}`;
};

const read = (cell: SheetCell) =>
  parseQuantity(cell.typed, {
    dimension: getQuantityEntry(cell.quantity).dimension,
    defaultUnit: cell.unit,
  });

const faulty = (cell: SheetCell, fault: { name: string; detail: string }): JudgedCell => ({
  cell,
  state: 'faulty',
  detail:
    // “0.84O1” is a number with a slip in it, not one in the unit O1.
    fault.name === 'not-a-number' || /\d\D+\d$/.test(cell.typed.replace(/[.,]/g, ''))
      ? `${cellWords(cell)}: “${cell.typed}” is no number. Kept as written.`
      : `${cellWords(cell)}: ${fault.detail} Kept as written.`,
});

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
    implausible(seen, shown).map(({ cell, detail }) => [placeKey(cell), detail]),
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
        };
  });
};
