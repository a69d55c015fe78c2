import type { EntityManager } from '@mikro-orm/postgresql';
import { randomUUID } from 'node:crypto';
import type { Clock } from '../clock';
import type { Actor } from '../auth/scope';

export interface AuditChange {
  field: string;
  old: unknown;
  new: unknown;
}

export type AuditSource = 'screen' | 'paste' | 'upload' | 'api' | 'job' | 'set-up';

/** What a command brings along besides its input. `route()` makes it; jobs and the demonstration make their own. */
export interface CommandContext {
  em: EntityManager;
  clock: Clock;
  requestId: string | null;
  source: AuditSource;
}

interface Acting {
  actor: Actor | null;
  role: string;
  organisationId: string;
  studyId?: string | null;
}

export interface AuditRecord {
  /** `domain:verb`, e.g. `site-log:correct`. */
  action: string;
  recordType: string;
  recordId: string;
  changes?: AuditChange[];
  reason?: string | null;
}

/**
 * Writes the audit row of a change, in the change's own transaction, and returns its digest. The database numbers and
 * chains it; nobody can change or remove it afterwards.
 */
export async function recordAudit(context: CommandContext, acting: Acting, record: AuditRecord): Promise<string> {
  const rows = await context.em.execute<{ digest: string }[]>(
    `insert into audit_entry (id, organisation_id, study_id, at, actor_id, actor_name, actor_role, action, record_type, record_id, changes, reason, source, request_id, sequence, previous_digest, digest)
     values (?, ?, ?, ?, ?, ?, ?, ?, ?, ?, ?::jsonb, ?, ?, ?, 0, '', '') returning digest`,
    [
      randomUUID(),
      acting.organisationId,
      acting.studyId ?? null,
      context.clock.now(),
      acting.actor?.personId ?? null,
      acting.actor?.name ?? 'Kalends',
      acting.role,
      record.action,
      record.recordType,
      record.recordId,
      JSON.stringify(record.changes ?? []),
      record.reason ?? null,
      context.source,
      context.requestId,
    ],
  );
  return rows[0]!.digest;
}

/** The fields in which two states differ, for an audit row. */
export function changedFields(before: Record<string, unknown>, after: Record<string, unknown>): AuditChange[] {
  return Object.keys(after)
    .filter((field) => JSON.stringify(before[field] ?? null) !== JSON.stringify(after[field] ?? null))
    .map((field) => ({ field, old: before[field] ?? null, new: after[field] ?? null }));
}
