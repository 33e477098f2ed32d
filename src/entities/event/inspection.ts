import { defineEntity, type InferEntity } from '@mikro-orm/core';
import type { InspectionState } from '@/domain/inspection/state';
import type { BoreLayout } from '@/domain/tappet/layout/bore-layout';

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
    layout: p.json<BoreLayout>(),
    state: p.text().$type<InspectionState>(),
    stateReason: p.text(),
    correctionReason: p.text(),
    bay: p.text(),
    /** Where it is taken apart, when that is not the event's own barn. */
    place: p.text().default(''),
    inspectorId: p.uuid().nullable(),
    openedAt: p.datetime().nullable(),
    closedAt: p.datetime().nullable(),
    version: p.integer().version(),
  }),
});

export type Inspection = InferEntity<typeof Inspection>;
