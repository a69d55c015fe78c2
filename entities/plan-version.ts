import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { createdAt, tenantColumns } from './columns';
import type { Plan, PlanReason } from '../lib/studies/schema';

export const PlanVersion = defineEntity({
  name: 'PlanVersion',
  tableName: 'plan_version',
  properties: {
    ...tenantColumns(),
    studyId: p.uuid(),
    number: p.integer(),
    plan: p.json<Plan>(),
    reasonKind: p.string().$type<PlanReason>().nullable(),
    reason: p.text().nullable(),
    createdAt: createdAt(),
    createdBy: p.uuid(),
  },
});

export type PlanVersionRow = InferEntity<typeof PlanVersion>;
