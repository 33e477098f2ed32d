import type { QuantityName } from '../../../rulebook/quantity-catalogue';
import type { Valve } from '../../../tappet/layout/bore-layout';

/** What a column of somebody's sheet holds. */
export type ColumnMeaning =
  | { readonly kind: 'position' }
  | { readonly kind: 'cylinder' }
  | { readonly kind: 'valve' }
  | {
      readonly kind: 'reading';
      readonly quantity: QuantityName;
      readonly unit: string;
      readonly depth: string;
      readonly axis: string;
      /** Where each row is a cylinder and the column says which of its bores. */
      readonly valve?: Valve | undefined;
    }
  | { readonly kind: 'not-taken' };

export interface SheetColumn {
  /** From 0. */
  readonly at: number;
  /** As it stands in the file, title rows of two or more put together. */
  readonly header: string;
  /** By which a choice of its meaning is kept: its heading, or its place where it has none. */
  readonly key: string;
  readonly meaning: ColumnMeaning;
  /** The person said what it holds. */
  readonly chosen: boolean;
  /** Does not show in the spreadsheet. */
  readonly hidden: boolean;
  /** The first values that stand in it. */
  readonly samples: readonly string[];
}

/** `A`, `B`, … `AA`: a column as spreadsheets name it. */
export const columnName = (at: number): string => {
  const rest = Math.floor(at / 26);
  return (rest === 0 ? '' : columnName(rest - 1)) + String.fromCharCode(65 + (at % 26));
};

/** `D7`; row and column from 0. */
export const cellName = (row: number, column: number): string => `${columnName(column)}${row + 1}`;

/** A column nobody has explained yet, though something stands in it: the person is asked once. */
export const isUnexplained = (column: SheetColumn): boolean =>
  column.meaning.kind === 'not-taken' && !column.chosen && column.samples.length > 0;
