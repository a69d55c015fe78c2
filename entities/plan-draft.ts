import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { tenantColumns } from './columns';
import type { PlanDraftSections } from '../lib/studies/schema';

export const PlanDraft = defineEntity({
  name: 'PlanDraft',
  tableName: 'plan_draft',
  properties: {
    ...tenantColumns(),
    studyId: p.uuid(),
    sections: p.json<PlanDraftSections>(),
    updatedAt: p.datetime(),
    updatedBy: p.uuid(),
    version: p.integer().version(),
  },
});

export type PlanDraftRow = InferEntity<typeof PlanDraft>;
