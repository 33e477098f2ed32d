import { defineEntity, type InferEntity } from '@mikro-orm/core';

/** A link by which a guardian signs one paperwork. */
export const GuardianRequest = defineEntity({
  name: 'GuardianRequest',
  tableName: 'guardian_request',
  properties: (p) => ({
    seriesId: p.uuid().primary(),
    id: p.uuid().primary(),
    guardianshipId: p.uuid(),
    paperworkId: p.uuid(),
    tokenHash: p.blob(),
    askedBy: p.uuid(),
    askedAt: p.datetime(),
    expiresAt: p.datetime(),
    usedAt: p.datetime().nullable(),
  }),
});

export type GuardianRequest = InferEntity<typeof GuardianRequest>;
