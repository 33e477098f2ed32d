import { defineEntity, type InferEntity } from '@mikro-orm/core';

export const Person = defineEntity({
  name: 'Person',
  tableName: 'person',
  properties: (p) => ({
    id: p.uuid().primary(),
    name: p.text(),
    latinName: p.text().nullable(),
    email: p.text(),
    siteAdmin: p.boolean(),
    createdAt: p.datetime(),
  }),
});

export type Person = InferEntity<typeof Person>;
