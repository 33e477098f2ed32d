import { defineEntity, type InferEntity } from '@mikro-orm/core';
import type { Role } from '@/domain/access/permission';

export const Invitation = defineEntity({
  name: 'Invitation',
  tableName: 'invitation',
  properties: (p) => ({
    seriesId: p.uuid().primary(),
    id: p.uuid().primary(),
    email: p.text(),
    role: p.text().$type<Role>(),
    tokenHash: p.blob(),
    invitedBy: p.uuid(),
    createdAt: p.datetime(),
    expiresAt: p.datetime(),
    acceptedAt: p.datetime().nullable(),
    acceptedBy: p.uuid().nullable(),
    revokedAt: p.datetime().nullable(),
  }),
});

export type Invitation = InferEntity<typeof Invitation>;
