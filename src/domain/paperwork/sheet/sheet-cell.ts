import type { SheetForm } from '../../rulebook/form/form';
import type { QuantityName } from '../../rulebook/quantity-catalogue';
import type { BoreLayout } from '../../tappet/layout/bore-layout';
import type { CellSource } from '../document';

/** Which number a cell holds. */
export interface CellPlace {
  /** A bore's name (`3 intake`), a cylinder's number, or `engine`. */
  readonly position: string;
  readonly quantity: QuantityName;
  readonly depth: string;
  readonly axis: string;
}

/** One cell of a measurement sheet as somebody wrote it: it may be no number at all. */
export interface SheetCell extends CellPlace {
  readonly typed: string;
  /** The column's unit; a unit in the cell itself goes before it. */
  readonly unit: string;
  readonly source?: CellSource | undefined;
  /** The person was asked about it and stands by it. */
  readonly confirmed?: boolean | undefined;
}

/** What the rules want on a sheet, and the engine it is filled in for. */
export interface WantedSheet {
  readonly form: SheetForm;
  readonly layout: BoreLayout;
}

export const placeKey = (place: CellPlace): string =>
  [place.position, place.quantity, place.depth, place.axis].join('|');

export const samePlace = (a: CellPlace, b: CellPlace): boolean => placeKey(a) === placeKey(b);

/** The cell as somebody typed it anew: what a file held there stays to be seen, and they stand by nothing yet. */
export const retyped = (cell: SheetCell, typed: string): SheetCell => {
  const { source, confirmed: _confirmed, ...rest } = cell;
  if (source === undefined) return { ...rest, typed };
  const { held = cell.typed, ...place } = source;
  return { ...rest, typed, source: typed === held ? place : { ...place, held } };
};

/** `row 7, column D of lifters.csv`; a workbook of several sheets names the one. */
export const sourceWords = ({ file, cell }: CellSource): string => {
  const [, sheet, column = '', row = ''] = /^(?:(.*)!)?([A-Z]+)(\d+)$/.exec(cell) ?? [];
  const place = `row ${row}, column ${column}`;
  return sheet === undefined ? `${place} of ${file}` : `${place} of “${sheet}” in ${file}`;
};
