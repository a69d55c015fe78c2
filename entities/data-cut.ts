import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { tenantColumns } from './columns';
import type { AggregateCounts, CutCounts, SiteDifference } from '../lib/data-cuts/schema';

export const DataCut = defineEntity({
  name: 'DataCut',
  tableName: 'data_cut',
  properties: {
    ...tenantColumns(),
    studyId: p.uuid(),
    number: p.integer(),
    cutoffOn: p.date(),
    kind: p.string().$type<'subjects' | 'aggregate'>(),
    fileName: p.string().nullable(),
    fileKey: p.string().nullable(),
    fileSha256: p.string().nullable(),
    fileBytes: p.integer().nullable(),
    counts: p.json<CutCounts>(),
    aggregate: p.json<AggregateCounts>().nullable(),
    differences: p.json<SiteDifference[]>(),
    note: p.text().nullable(),
    acceptedAt: p.datetime(),
    acceptedBy: p.uuid(),
  },
});

export type DataCutRow = InferEntity<typeof DataCut>;
