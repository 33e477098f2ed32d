import { defineEntity, type InferEntity } from '@mikro-orm/core';

export const Season = defineEntity({
  name: 'Season',
  tableName: 'season',
  properties: (p) => ({
    seriesId: p.uuid().primary(),
    id: p.uuid().primary(),
    slug: p.text(),
    name: p.text(),
    startsOn: p.date(),
    endsOn: p.date(),
  }),
});

export type Season = InferEntity<typeof Season>;
