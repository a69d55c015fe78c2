import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { createdAt, tenantColumns } from './columns';

export const OrganisationMember = defineEntity({
  name: 'OrganisationMember',
  tableName: 'organisation_member',
  properties: {
    ...tenantColumns(),
    personId: p.uuid(),
    role: p.string().$type<'owner' | 'member'>(),
    createdAt: createdAt(),
  },
});

export type OrganisationMemberRow = InferEntity<typeof OrganisationMember>;
