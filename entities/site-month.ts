import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { tenantColumns } from './columns';

export const SiteMonth = defineEntity({
  name: 'SiteMonth',
  tableName: 'site_month',
  properties: {
    ...tenantColumns(),
    studyId: p.uuid(),
    siteId: p.uuid(),
    /** First day of the calendar month. */
    month: p.date(),
    screened: p.integer().nullable(),
    failed: p.integer().nullable(),
    randomised: p.integer().nullable(),
    events: p.integer().nullable(),
    withdrawn: p.integer().nullable(),
    loggedAt: p.datetime(),
    loggedBy: p.uuid(),
    version: p.integer().version(),
  },
});

export type SiteMonthRow = InferEntity<typeof SiteMonth>;
