import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { createdAt, tenantColumns } from './columns';

export const Study = defineEntity({
  name: 'Study',
  tableName: 'study',
  properties: {
    ...tenantColumns(),
    code: p.string(),
    title: p.string(),
    sponsorName: p.string(),
    createdAt: createdAt(),
    createdBy: p.uuid(),
    version: p.integer().version(),
  },
});

export type StudyRow = InferEntity<typeof Study>;
