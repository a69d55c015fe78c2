import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { tenantColumns } from './columns';
import type { PublishedForecast } from '../lib/publications/schema';

export const Publication = defineEntity({
  name: 'Publication',
  tableName: 'publication',
  properties: {
    ...tenantColumns(),
    studyId: p.uuid(),
    runId: p.uuid(),
    number: p.integer(),
    note: p.text(),
    content: p.json<PublishedForecast>(),
    auditDigest: p.string(),
    publishedAt: p.datetime(),
    publishedBy: p.uuid(),
  },
});

export type PublicationRow = InferEntity<typeof Publication>;
