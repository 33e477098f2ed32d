import { defineEntity, type InferEntity } from '@mikro-orm/core';

export const EngineOffer = defineEntity({
  name: 'EngineOffer',
  tableName: 'engine_offer',
  properties: (p) => ({
    id: p.uuid().primary(),
    engineId: p.uuid(),
    fromId: p.uuid(),
    email: p.text(),
    kind: p.text().$type<'sold' | 'lent'>(),
    untilAt: p.datetime().nullable(),
    tokenHash: p.blob(),
    offeredAt: p.datetime(),
    expiresAt: p.datetime(),
    acceptedAt: p.datetime().nullable(),
    acceptedBy: p.uuid().nullable(),
    withdrawnAt: p.datetime().nullable(),
  }),
});

export type EngineOffer = InferEntity<typeof EngineOffer>;
