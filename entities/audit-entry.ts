import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { tenantColumns } from './columns';
import type { AuditChange } from '../lib/audit/record';

export const AuditEntry = defineEntity({
  name: 'AuditEntry',
  tableName: 'audit_entry',
  properties: {
    ...tenantColumns(),
    /** Given by the database, per organisation, without gaps. */
    sequence: p.bigint('number').nullable(),
    studyId: p.uuid().nullable(),
    at: p.datetime(),
    actorId: p.uuid().nullable(),
    actorName: p.string(),
    actorRole: p.string(),
    action: p.string(),
    recordType: p.string(),
    recordId: p.string(),
    changes: p.json<AuditChange[]>(),
    reason: p.text().nullable(),
    source: p.string(),
    requestId: p.string().nullable(),
    previousDigest: p.string().nullable(),
    digest: p.string().nullable(),
  },
});

export type AuditEntryRow = InferEntity<typeof AuditEntry>;
