import { defineEntity, type InferEntity } from '@mikro-orm/core';

export const Car = defineEntity({
  name: 'Car',
  tableName: 'car',
  properties: (p) => ({
    id: p.uuid().primary(),
    ownerId: p.uuid(),
    name: p.text(),
    createdAt: p.datetime(),
  }),
});

export type Car = InferEntity<typeof Car>;
