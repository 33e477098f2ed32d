import { defineEntity, type InferEntity } from '@mikro-orm/core';

export const Mail = defineEntity({
  name: 'Mail',
  tableName: 'mail',
  properties: (p) => ({
    id: p.uuid().primary(),
    seriesId: p.uuid().nullable(),
    personId: p.uuid().nullable(),
    address: p.text(),
    kind: p.text(),
    subject: p.text(),
    messageId: p.text(),
    content: p.json<Record<string, unknown>>(),
    state: p.text().$type<'to-send' | 'sent' | 'failed'>(),
    attempts: p.integer(),
    lastError: p.text().nullable(),
    createdAt: p.datetime(),
    sentAt: p.datetime().nullable(),
  }),
});

export type Mail = InferEntity<typeof Mail>;
