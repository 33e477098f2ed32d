import { defineEntity, type InferEntity } from '@mikro-orm/core';
import type { Role } from '@/domain/access/permission';

export const Membership = defineEntity({
  name: 'Membership',
  tableName: 'membership',
  properties: (p) => ({
    seriesId: p.uuid().primary(),
    id: p.uuid().primary(),
    personId: p.uuid(),
    role: p.text().$type<Role>(),
    grantedBy: p.uuid().nullable(),
    since: p.datetime(),
    endedAt: p.datetime().nullable(),
  }),
});

export type Membership = InferEntity<typeof Membership>;
