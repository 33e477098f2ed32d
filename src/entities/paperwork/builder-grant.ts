import { defineEntity, type InferEntity } from '@mikro-orm/core';
import type { GrantRight } from '@/domain/access/helping';

export const BuilderGrant = defineEntity({
  name: 'BuilderGrant',
  tableName: 'builder_grant',
  properties: (p) => ({
    id: p.uuid().primary(),
    competitorId: p.uuid(),
    email: p.text(),
    builderId: p.uuid().nullable(),
    /** Nothing where all of the competitor's engines are meant. */
    engineIds: p.array<string>().columnType('uuid[]').nullable(),
    rights: p.array<GrantRight>().columnType('text[]'),
    untilAt: p.datetime(),
    tokenHash: p.blob(),
    invitedAt: p.datetime(),
    expiresAt: p.datetime(),
    acceptedAt: p.datetime().nullable(),
    withdrawnAt: p.datetime().nullable(),
    version: p.integer().version(),
  }),
});

export type BuilderGrant = InferEntity<typeof BuilderGrant>;
