import { defineEntity, type InferEntity } from '@mikro-orm/core';

export const VerdictDraft = defineEntity({
  name: 'VerdictDraft',
  tableName: 'verdict_draft',
  properties: (p) => ({
    seriesId: p.uuid().primary(),
    id: p.uuid().primary(),
    inspectionId: p.uuid(),
    content: p.json<Record<string, unknown>>(),
    version: p.integer().version(),
    updatedBy: p.uuid(),
    updatedAt: p.datetime(),
    publishedAt: p.datetime().nullable(),
  }),
});

export type VerdictDraft = InferEntity<typeof VerdictDraft>;
