import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { tenantColumns } from './columns';
import type { SubjectStatus } from '../lib/engine/types';

export const DataCutSubject = defineEntity({
  name: 'DataCutSubject',
  tableName: 'data_cut_subject',
  properties: {
    ...tenantColumns(),
    dataCutId: p.uuid(),
    subjectId: p.string(),
    siteCode: p.string(),
    randomisedOn: p.date(),
    status: p.string().$type<SubjectStatus>(),
    statusOn: p.date(),
  },
});

export type DataCutSubjectRow = InferEntity<typeof DataCutSubject>;
