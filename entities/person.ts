import { defineEntity, type InferEntity, p } from '@mikro-orm/core';

export const Person = defineEntity({
  name: 'Person',
  tableName: 'person',
  properties: {
    id: p.uuid().primary(),
    name: p.string(),
    email: p.string(),
    emailVerified: p.boolean(),
    image: p.text().nullable(),
    createdAt: p.datetime(),
    updatedAt: p.datetime(),
  },
});

export type PersonRow = InferEntity<typeof Person>;
