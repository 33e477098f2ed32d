import { defineEntity, type InferEntity } from '@mikro-orm/core';

export const Session = defineEntity({
  name: 'Session',
  tableName: 'session',
  properties: (p) => ({
    id: p.uuid().primary(),
    tokenHash: p.blob(),
    personId: p.uuid(),
    method: p.text().$type<'identity-provider' | 'email-link'>(),
    agent: p.text(),
    createdAt: p.datetime(),
    authenticatedAt: p.datetime(),
    seenAt: p.datetime(),
    expiresAt: p.datetime(),
    revokedAt: p.datetime().nullable(),
  }),
});

export type Session = InferEntity<typeof Session>;
