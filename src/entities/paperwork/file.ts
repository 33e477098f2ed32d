import { defineEntity, type InferEntity } from '@mikro-orm/core';

export const KeptFile = defineEntity({
  name: 'KeptFile',
  tableName: 'file',
  properties: (p) => ({
    seriesId: p.uuid().primary(),
    id: p.uuid().primary(),
    paperworkId: p.uuid().nullable(),
    inspectionId: p.uuid().nullable(),
    gaugeId: p.uuid().nullable(),
    purpose: p.text().$type<'photograph' | 'sheet' | 'finding' | 'certificate'>(),
    item: p.text(),
    name: p.text(),
    declaredType: p.text(),
    declaredBytes: p.bigint('number'),
    uploadKey: p.text(),
    /** The store's name for an upload that is sent in parts. */
    uploadId: p.text().nullable(),
    state: p.text().$type<'expected' | 'kept' | 'refused'>(),
    objectKey: p.text().nullable(),
    mediaType: p.text().nullable(),
    bytes: p.bigint('number').nullable(),
    sha256: p.blob().nullable(),
    width: p.integer().nullable(),
    height: p.integer().nullable(),
    previews: p.json<Record<string, string>>().nullable(),
    refusedBecause: p.text().nullable(),
    createdBy: p.uuid(),
    createdAt: p.datetime(),
    keptAt: p.datetime().nullable(),
    /** Taken out of the draft; versions handed in before still show it. */
    removedAt: p.datetime().nullable(),
  }),
});

export type KeptFile = InferEntity<typeof KeptFile>;
