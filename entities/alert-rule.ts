import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { createdAt, tenantColumns } from './columns';
import type { AlertCondition, AlertRecipients } from '../lib/alerts/schema';

export const AlertRule = defineEntity({
  name: 'AlertRule',
  tableName: 'alert_rule',
  properties: {
    ...tenantColumns(),
    studyId: p.uuid(),
    milestoneCode: p.string(),
    condition: p.json<AlertCondition>(),
    recipients: p.json<AlertRecipients>(),
    isActive: p.boolean(),
    createdAt: createdAt(),
    createdBy: p.uuid(),
    version: p.integer().version(),
  },
});

export type AlertRuleRow = InferEntity<typeof AlertRule>;
