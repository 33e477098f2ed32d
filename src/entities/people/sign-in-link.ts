import { defineEntity, type InferEntity } from '@mikro-orm/core';

export const SignInLink = defineEntity({
  name: 'SignInLink',
  tableName: 'sign_in_link',
  properties: (p) => ({
    id: p.uuid().primary(),
    tokenHash: p.blob(),
    email: p.text(),
    returnTo: p.text(),
    createdAt: p.datetime(),
    expiresAt: p.datetime(),
    consumedAt: p.datetime().nullable(),
  }),
});

export type SignInLink = InferEntity<typeof SignInLink>;
