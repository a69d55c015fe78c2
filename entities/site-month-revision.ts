import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { tenantColumns } from './columns';
import type { CorrectionReason, LogField } from '../lib/site-log/schema';

export const SiteMonthRevision = defineEntity({
  name: 'SiteMonthRevision',
  tableName: 'site_month_revision',
  properties: {
    ...tenantColumns(),
    siteMonthId: p.uuid(),
    field: p.string().$type<LogField>(),
    oldValue: p.integer().nullable(),
    newValue: p.integer().nullable(),
    reasonKind: p.string().$type<CorrectionReason>().nullable(),
    reason: p.text().nullable(),
    changedAt: p.datetime(),
    changedBy: p.uuid(),
  },
});

export type SiteMonthRevisionRow = InferEntity<typeof SiteMonthRevision>;
