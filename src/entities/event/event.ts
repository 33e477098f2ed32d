import { defineEntity, type InferEntity } from '@mikro-orm/core';

export const Event = defineEntity({
  name: 'Event',
  tableName: 'event',
  properties: (p) => ({
    seriesId: p.uuid().primary(),
    id: p.uuid().primary(),
    seasonId: p.uuid(),
    number: p.integer(),
    slug: p.text(),
    name: p.text(),
    track: p.text(),
    zone: p.text(),
    startsAt: p.datetime(),
    endsAt: p.datetime(),
    protestMinutes: p.integer(),
    resultsState: p.text().$type<'none' | 'unofficial' | 'official'>(),
    version: p.integer().version(),
  }),
});

export type Event = InferEntity<typeof Event>;
