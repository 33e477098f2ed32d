import { defineEntity, type InferEntity } from '@mikro-orm/core';

export const Identity = defineEntity({
  name: 'Identity',
  tableName: 'identity',
  properties: (p) => ({
    issuer: p.text().primary(),
    subject: p.text().primary(),
    personId: p.uuid(),
    createdAt: p.datetime(),
  }),
});

export type Identity = InferEntity<typeof Identity>;
