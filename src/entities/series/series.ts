import { defineEntity, type InferEntity } from '@mikro-orm/core';

export const Series = defineEntity({
  name: 'Series',
  tableName: 'series',
  properties: (p) => ({
    id: p.uuid().primary(),
    slug: p.text(),
    name: p.text(),
    zone: p.text(),
    currency: p.text(),
    protestMinutes: p.integer(),
    appealDays: p.integer(),
    bondMinor: p.bigint(),
    appealsAddress: p.text(),
    createdAt: p.datetime(),
  }),
});

export type Series = InferEntity<typeof Series>;
