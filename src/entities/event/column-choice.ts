import { defineEntity, type InferEntity } from '@mikro-orm/core';

/** Under which names a series' files carry their columns; the last choice that was entered. */
export const ColumnChoice = defineEntity({
  name: 'ColumnChoice',
  tableName: 'column_choice',
  properties: (p) => ({
    seriesId: p.uuid().primary(),
    purpose: p.text().primary().$type<'entries'>(),
    columns: p.json<Readonly<Record<string, string>>>(),
    updatedBy: p.uuid(),
    updatedAt: p.datetime(),
  }),
});

export type ColumnChoice = InferEntity<typeof ColumnChoice>;
