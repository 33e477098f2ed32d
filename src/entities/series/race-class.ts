import { defineEntity, type InferEntity } from '@mikro-orm/core';

export const RaceClass = defineEntity({
  name: 'RaceClass',
  tableName: 'class',
  properties: (p) => ({
    seriesId: p.uuid().primary(),
    id: p.uuid().primary(),
    seasonId: p.uuid(),
    slug: p.text(),
    name: p.text(),
    /** Days until the rest of the paperwork is due after an engine was changed at the track. */
    swapDueDays: p.integer().default(3),
  }),
});

export type RaceClass = InferEntity<typeof RaceClass>;
