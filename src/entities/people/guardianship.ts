import { defineEntity, type InferEntity } from '@mikro-orm/core';

/** A competitor under age, and who signs for them in a series. */
export const Guardianship = defineEntity({
  name: 'Guardianship',
  tableName: 'guardianship',
  properties: (p) => ({
    seriesId: p.uuid().primary(),
    id: p.uuid().primary(),
    minorId: p.uuid(),
    guardianName: p.text(),
    guardianEmail: p.text(),
    guardianId: p.uuid().nullable(),
    markedBy: p.uuid(),
    since: p.datetime(),
    endedAt: p.datetime().nullable(),
  }),
});

export type Guardianship = InferEntity<typeof Guardianship>;
