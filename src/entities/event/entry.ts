import { defineEntity, type InferEntity } from '@mikro-orm/core';

export const Entry = defineEntity({
  name: 'Entry',
  tableName: 'entry',
  properties: (p) => ({
    seriesId: p.uuid().primary(),
    id: p.uuid().primary(),
    eventId: p.uuid(),
    classId: p.uuid(),
    carNumber: p.text(),
    competitorId: p.uuid().nullable(),
    competitorName: p.text(),
    driver: p.text().default(''),
    /** Lap times as they were written, in order. */
    laps: p.json<readonly string[]>().default('[]'),
    engineReference: p.text(),
    paperworkId: p.uuid().nullable(),
    /** Set by an engine swap; picks after it go by this engine's paperwork alone. */
    engineId: p.uuid().nullable(),
    position: p.integer().nullable(),
    state: p.text().$type<'entered' | 'withdrawn'>(),
    version: p.integer().version(),
  }),
});

export type Entry = InferEntity<typeof Entry>;
