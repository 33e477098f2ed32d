import { defineEntity, type InferEntity } from '@mikro-orm/core';

export const Engine = defineEntity({
  name: 'Engine',
  tableName: 'engine',
  properties: (p) => ({
    id: p.uuid().primary(),
    ownerId: p.uuid(),
    reference: p.text(),
    layout: p.json<Record<string, unknown>>(),
    blockCasting: p.text(),
    headCastings: p.text(),
    serial: p.text(),
    /** Whom it is lent to, and until when; back with the owner from then on. */
    holderId: p.uuid().nullable(),
    heldUntil: p.datetime().nullable(),
    version: p.integer().version(),
    createdAt: p.datetime(),
  }),
});

export type Engine = InferEntity<typeof Engine>;
