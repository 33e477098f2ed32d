import { asciiIn } from '../../quantity/format';
import { decimalsOf } from '../../quantity/number-text';
import type { Quantity } from '../../quantity/quantity';
import type { RuleDimension } from '../../rulebook/quantities/entry';
import type { QuantityName } from '../../rulebook/quantity-catalogue';
import { placeKey, type SheetCell } from './sheet-cell';

/** A cell that is a number; `number` in the base of its dimension, only to compare with. */
export interface Seen {
  readonly cell: SheetCell;
  readonly quantity: Quantity<RuleDimension>;
  readonly number: number;
}

export interface Doubt {
  readonly cell: SheetCell;
  readonly detail: string;
}

export type Show = (quantity: Quantity) => string;

/** How far one part may lie from its fellows before it is asked about: parts are alike, weights and loads less so. */
const ALIKE: Partial<Record<QuantityName, number>> = {
  'lifter-body-diameter': 0.004,
  'foot-diameter': 0.01,
  'tappet-bore-diameter': 0.004,
  'cylinder-bore': 0.01,
};
const OTHERWISE = 0.15;
const ENOUGH = 4;

/** Slips of the unit or the decimal point, by the factor they make. */
const SLIPS: readonly (readonly [number, string])[] = [
  [25.4, 'Is it in millimetres?'],
  [1 / 25.4, 'Is it in inches?'],
  [10, 'Is the decimal point in its place?'],
  [0.1, 'Is the decimal point in its place?'],
  [100, 'Is the decimal point in its place?'],
  [0.01, 'Is the decimal point in its place?'],
];

const median = (values: readonly number[]): number => {
  const ordered = values.toSorted((a, b) => a - b);
  const middle = Math.floor(ordered.length / 2);
  const upper = ordered[middle] ?? 0;
  return ordered.length % 2 === 1 ? upper : ((ordered[middle - 1] ?? 0) + upper) / 2;
};

const near = (value: number, wanted: number): boolean => Math.abs(value / wanted - 1) < 0.05;

const slip = (ratio: number): string =>
  SLIPS.filter(([factor]) => near(ratio, factor)).map(([, words]) => ` ${words}`)[0] ?? '';

/** Apart from its fellows in the same column. */
const apart = (group: readonly Seen[], show: Show): readonly Doubt[] => {
  if (group.length < ENOUGH) return [];
  const middle = median(group.map(({ number }) => number));
  const typical = group.toSorted(
    (a, b) => Math.abs(a.number - middle) - Math.abs(b.number - middle),
  )[0];
  if (typical === undefined || middle === 0) return [];
  const reach = ALIKE[typical.cell.quantity] ?? OTHERWISE;
  return group
    .filter(({ number }) => Math.abs(number / middle - 1) > reach)
    .map(({ cell, quantity, number }) => {
      const places = decimalsOf(typical.quantity.text);
      const rest = `${asciiIn(typical.quantity, typical.quantity.unit, places)}`;
      const unit = typical.quantity.unit === quantity.unit ? '' : ` ${typical.quantity.unit}`;
      return {
        cell,
        detail: `${show(quantity)}, the rest are near ${rest}${unit}.${slip(number / middle)}`,
      };
    });
};

/** Common practice: lifters of 0.842, 0.875 and 0.904 in and their bores; wide bounds, since rules differ. */
const PART = { from: 0.5 * 0.0254, to: 1.5 * 0.0254 };
const LIFTER_PARTS: readonly QuantityName[] = [
  'lifter-body-diameter',
  'foot-diameter',
  'tappet-bore-diameter',
];

/** A whole column in the wrong unit has no fellows that differ. */
const outOfSize = (seen: readonly Seen[], show: Show): readonly Doubt[] =>
  seen
    .filter(
      ({ cell, number }) =>
        LIFTER_PARTS.includes(cell.quantity) && (number < PART.from || number > PART.to),
    )
    .map(({ cell, quantity, number }) => ({
      cell,
      detail: `${show(quantity)} is no size of a lifter or its bore.${
        number > PART.to ? ' Is it in millimetres?' : ' Is it a clearance, or in another unit?'
      }`,
    }));

/** A lifter does not go into a bore that is smaller. */
const tooSmall = (seen: readonly Seen[], show: Show): readonly Doubt[] =>
  seen
    .filter(({ cell }) => cell.quantity === 'tappet-bore-diameter')
    .flatMap(({ cell, quantity, number }) => {
      const lifter = seen.find(
        (other) =>
          other.cell.quantity === 'lifter-body-diameter' &&
          other.cell.position === cell.position &&
          other.number > number,
      );
      return lifter === undefined
        ? []
        : [
            {
              cell,
              detail: `${show(quantity)} is smaller than its lifter, ${show(lifter.quantity)}.`,
            },
          ];
    });

/** The cells to ask about, each once. */
export const implausible = (seen: readonly Seen[], show: Show): readonly Doubt[] => {
  const groups = new Map<QuantityName, Seen[]>();
  for (const one of seen) {
    groups.set(one.cell.quantity, [...(groups.get(one.cell.quantity) ?? []), one]);
  }
  const doubts = new Map<string, Doubt>();
  const found = [
    ...outOfSize(seen, show),
    ...[...groups.values()].flatMap((group) => apart(group, show)),
  ];
  for (const doubt of found) {
    if (doubt.cell.confirmed === true || doubts.has(placeKey(doubt.cell))) continue;
    doubts.set(placeKey(doubt.cell), doubt);
  }
  // A lifter that is already asked about is no measure for its bore.
  const trusted = seen.filter(({ cell }) => !doubts.has(placeKey(cell)));
  return [...doubts.values(), ...tooSmall(trusted, show)];
};
