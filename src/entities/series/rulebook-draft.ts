import { defineEntity, type InferEntity } from '@mikro-orm/core';

export const RulebookDraft = defineEntity({
  name: 'RulebookDraft',
  tableName: 'rulebook_draft',
  properties: (p) => ({
    seriesId: p.uuid().primary(),
    id: p.uuid().primary(),
    classId: p.uuid(),
    kind: p.text().$type<'edition' | 'bulletin'>(),
    title: p.text(),
    content: p.json<Record<string, unknown>>(),
    version: p.integer().version(),
    updatedBy: p.uuid(),
    updatedAt: p.datetime(),
    publishedAt: p.datetime().nullable(),
  }),
});

export type RulebookDraft = InferEntity<typeof RulebookDraft>;
