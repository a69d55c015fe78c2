import { defineEntity, type InferEntity, p } from '@mikro-orm/core';

export const Organisation = defineEntity({
  name: 'Organisation',
  tableName: 'organisation',
  properties: {
    id: p.uuid().primary(),
    name: p.string(),
    isDemonstration: p.boolean(),
    createdAt: p.datetime(),
  },
});

export type OrganisationRow = InferEntity<typeof Organisation>;
