import { defineEntity, type InferEntity } from '@mikro-orm/core';

export type PaperworkState = 'draft' | 'handed-in' | 'accepted' | 'returned' | 'withdrawn';

export const Paperwork = defineEntity({
  name: 'Paperwork',
  tableName: 'paperwork',
  properties: (p) => ({
    seriesId: p.uuid().primary(),
    id: p.uuid().primary(),
    classId: p.uuid(),
    competitorId: p.uuid(),
    engineId: p.uuid(),
    carNumber: p.text(),
    state: p.text().$type<PaperworkState>(),
    draft: p.json<Record<string, unknown>>(),
    versions: p.integer(),
    version: p.integer().version(),
    updatedBy: p.uuid(),
    updatedAt: p.datetime(),
  }),
});

export type Paperwork = InferEntity<typeof Paperwork>;
