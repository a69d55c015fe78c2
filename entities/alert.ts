import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { tenantColumns } from './columns';
import type { AlertContent } from '../lib/alerts/schema';

export const Alert = defineEntity({
  name: 'Alert',
  tableName: 'alert',
  properties: {
    ...tenantColumns(),
    studyId: p.uuid(),
    ruleId: p.uuid(),
    publicationId: p.uuid(),
    content: p.json<AlertContent>(),
    raisedAt: p.datetime(),
  },
});

export type AlertRow = InferEntity<typeof Alert>;
