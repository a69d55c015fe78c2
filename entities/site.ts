import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { createdAt, tenantColumns } from './columns';

export const Site = defineEntity({
  name: 'Site',
  tableName: 'site',
  properties: {
    ...tenantColumns(),
    studyId: p.uuid(),
    code: p.string(),
    name: p.string(),
    city: p.string(),
    country: p.string(),
    plannedEarliest: p.date().nullable(),
    plannedLikely: p.date().nullable(),
    plannedLatest: p.date().nullable(),
    activatedOn: p.date().nullable(),
    closedOn: p.date().nullable(),
    cap: p.integer().nullable(),
    createdAt: createdAt(),
    version: p.integer().version(),
  },
});

export type SiteRow = InferEntity<typeof Site>;
