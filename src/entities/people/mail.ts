import { defineEntity, type InferEntity } from '@mikro-orm/core';
import type { MailState } from '@/domain/mail/mail-state';

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
    state: p.text().$type<MailState>(),
    attempts: p.integer(),
    lastError: p.text().nullable(),
    /** What the receiving server said last, in its own words. */
    answer: p.text().nullable(),
    createdAt: p.datetime(),
    sentAt: p.datetime().nullable(),
    /** When its state changed last. */
    changedAt: p.datetime().nullable(),
  }),
});

export type Mail = InferEntity<typeof Mail>;
