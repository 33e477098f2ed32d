import { defineEntity, type InferEntity } from '@mikro-orm/core';

export const Inspection = defineEntity({
  name: 'Inspection',
  tableName: 'inspection',
  properties: (p) => ({
    seriesId: p.uuid().primary(),
    id: p.uuid().primary(),
    eventId: p.uuid(),
    entryId: p.uuid(),
    paperworkId: p.uuid().nullable(),
    paperworkNumber: p.integer().nullable(),
    pickedBecause: p.text(),
    pickedWords: p.text(),
    pickedBy: p.uuid(),
    pickedAt: p.datetime(),
    rulesHash: p.blob(),
    layout: p.json<Record<string, unknown>>(),
    state: p.text(),
    stateReason: p.text(),
    bay: p.text(),
    inspectorId: p.uuid().nullable(),
    openedAt: p.datetime().nullable(),
    closedAt: p.datetime().nullable(),
    version: p.integer().version(),
  }),
});

export type Inspection = InferEntity<typeof Inspection>;
