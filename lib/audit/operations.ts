import { defineOperation } from '../http/operation';
import { nothing, paged, studyParams } from '../http/params';
import { auditEntrySchema, auditQuery } from './schema';

export const listAuditOperation = defineOperation({
  method: 'GET',
  path: '/api/v1/studies/{code}/audit',
  summary: 'The study’s trail, newest first',
  access: { kind: 'study', action: 'audit:read' },
  params: studyParams,
  query: auditQuery,
  body: nothing,
  reply: paged(auditEntrySchema),
});
