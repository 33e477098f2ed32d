import { defineEntity, type InferEntity } from '@mikro-orm/core';
import type { ColumnMeaning } from '@/domain/paperwork/sheet/header/column-meaning';

/** What a person said about the columns of one set of headings, for the next file that has the same. */
export const SheetColumns = defineEntity({
  name: 'SheetColumns',
  tableName: 'sheet_columns',
  properties: (p) => ({
    personId: p.uuid().primary(),
    /** What kind of sheet, and what its rows are: `lifters bore`. */
    sheet: p.text().primary(),
    /** SHA-256 of the set of headings, hexadecimal. */
    headings: p.text().primary(),
    /** Pairs of a column's key and what it holds: a heading may be called anything, `constructor` too. */
    choices: p.json<readonly (readonly [string, ColumnMeaning])[]>(),
    updatedAt: p.datetime(),
  }),
});

export type SheetColumns = InferEntity<typeof SheetColumns>;
