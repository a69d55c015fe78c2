import type { AuditChange, CommandContext } from './record';
import type { StudyScope } from '../auth/scope';
import type { AuditEntryView, AuditQuery } from './schema';

interface Row {
  sequence: string;
  at: Date;
  actor_name: string;
  actor_role: string;
  action: string;
  record_type: string;
  record_id: string;
  changes: AuditChange[];
  reason: string | null;
  source: string;
  digest: string;
  total: number;
}

export interface AuditPage {
  items: AuditEntryView[];
  page: number;
  size: number;
  total: number;
}

export async function listAudit(
  scope: StudyScope<'audit:read'>,
  { query }: { query: AuditQuery },
  { em }: Pick<CommandContext, 'em'>,
): Promise<AuditPage> {
  const where = ['organisation_id = ?', 'study_id = ?'];
  const values: unknown[] = [scope.organisationId, scope.studyId];
  const narrow = (condition: string, value: unknown): void => {
    where.push(condition);
    values.push(value);
  };
  if (query.from) narrow(`at >= ?::date::timestamp at time zone 'UTC'`, query.from);
  if (query.to) narrow(`at < (?::date + 1)::timestamp at time zone 'UTC'`, query.to);
  if (query.person) narrow(`position(lower(?) in lower(actor_name)) > 0`, query.person);
  if (query.kind) narrow(`split_part(action, ':', 1) = ?`, query.kind);
  const rows = await em.execute<Row[]>(
    `select sequence, at, actor_name, actor_role, action, record_type, record_id, changes, reason, source, digest, count(*) over ()::int as total
       from audit_entry where ${where.join(' and ')} order by sequence desc limit ? offset ?`,
    [...values, query.size, (query.page - 1) * query.size],
  );
  const items = rows.map((row) => ({
    sequence: Number(row.sequence),
    at: new Date(row.at).toISOString(),
    actorName: row.actor_name,
    actorRole: row.actor_role,
    action: row.action,
    recordType: row.record_type,
    recordId: row.record_id,
    changes: row.changes,
    reason: row.reason,
    source: row.source,
    digest: row.digest,
  }));
  return { items, page: query.page, size: query.size, total: rows[0]?.total ?? 0 };
}
