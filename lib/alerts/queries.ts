import type { EntityManager } from '@mikro-orm/postgresql';
import { Alert } from '../../entities/alert';
import { AlertRule, type AlertRuleRow } from '../../entities/alert-rule';
import { PlanVersion } from '../../entities/plan-version';
import type { CommandContext } from '../audit/record';
import type { StudyAction, StudyRole } from '../auth/permissions';
import type { StudyScope } from '../auth/scope';
import type { MailState } from '../email/schema';
import {
  type AlertContent,
  ALERT_ROLES,
  type AlertRecipients,
  type AlertRules,
  type SentAlert,
  type SentAlertsQuery,
} from './schema';
import { serialiseRule } from './serialise';

type Read = Pick<CommandContext, 'em'>;
type AlertScope = StudyScope<'alerts:read'> | StudyScope<'alerts:change'>;

/** More rules than a study's milestones times what can be said of each are a mistake, not a list. */
export const MOST_RULES = 200;

const keyOf = (scope: StudyScope<StudyAction>) => ({ organisationId: scope.organisationId, studyId: scope.studyId });

export async function listAlertRules(
  scope: StudyScope<'alerts:read'>,
  _input: unknown,
  { em }: Read,
): Promise<AlertRules> {
  const rows = await em.find(AlertRule, keyOf(scope), {
    orderBy: { milestoneCode: 'asc', createdAt: 'asc' },
    limit: MOST_RULES,
  });
  const milestones = await listMilestones(scope, em);
  const raised = await countRaised(scope, em);
  return {
    rules: rows.map((row) => serialiseRule(row, milestones, raised.get(row.id) ?? 0)),
    milestones,
    readers: await listReaders(scope, em),
  };
}

/** The milestones of the plan as it stands. */
export async function listMilestones(scope: AlertScope, em: EntityManager): Promise<AlertRules['milestones']> {
  const version = await em.findOne(PlanVersion, keyOf(scope), { orderBy: { number: 'desc' } });
  return (version?.plan.milestones ?? []).map(({ code, name }) => ({ code, name: name ?? code }));
}

export async function countRaised(scope: AlertScope, em: EntityManager): Promise<Map<string, number>> {
  const rows = await em.execute<{ rule_id: string; count: number }[]>(
    `select rule_id, count(*)::int as count from alert where organisation_id = ? and study_id = ? group by rule_id`,
    [scope.organisationId, scope.studyId],
  );
  return new Map(rows.map(({ rule_id, count }) => [rule_id, count]));
}

interface Reader {
  id: string;
  name: string;
  email: string;
  role: StudyRole;
}

async function readersOf(scope: StudyScope<StudyAction>, em: EntityManager): Promise<Reader[]> {
  return em.execute<Reader[]>(
    `select p.id, p.name, p.email, m.role from study_member m join person p on p.id = m.person_id
      where m.organisation_id = ? and m.study_id = ? and m.role = any(?) order by p.name, p.id limit 1000`,
    [scope.organisationId, scope.studyId, `{${ALERT_ROLES.join(',')}}`],
  );
}

/** The people who may be told: those who read publications. */
export async function listReaders(scope: AlertScope, em: EntityManager): Promise<AlertRules['readers']> {
  return (await readersOf(scope, em)).map(({ id, name, role }) => ({ id, name, role }));
}

/** Whom a rule tells today: a person who has left or changed into a role without forecasts is told no more. */
export async function listRecipients(
  scope: StudyScope<StudyAction>,
  { roles, personIds }: AlertRecipients,
  em: EntityManager,
): Promise<{ name: string; email: string }[]> {
  return (await readersOf(scope, em)).filter(({ id, role }) => roles.includes(role) || personIds.includes(id));
}

export function listActiveRules(scope: StudyScope<StudyAction>, em: EntityManager): Promise<AlertRuleRow[]> {
  return em.find(
    AlertRule,
    { ...keyOf(scope), isActive: true },
    { orderBy: { createdAt: 'asc', id: 'asc' }, limit: MOST_RULES },
  );
}

/** The publication of which a rule last spoke under the condition that it has now. */
export async function findLastAlert(rule: AlertRuleRow, em: EntityManager): Promise<number | null> {
  const [row] = await em.execute<{ number: number }[]>(
    `select (content->>'publicationNumber')::int as number from alert
      where organisation_id = ? and rule_id = ? and content->>'milestoneCode' = ? and content->'condition' = ?::jsonb order by 1 desc limit 1`,
    [rule.organisationId, rule.id, rule.milestoneCode, JSON.stringify(rule.condition)],
  );
  return row?.number ?? null;
}

export async function listSentAlerts(
  scope: StudyScope<'alerts:read'>,
  { query }: { query: SentAlertsQuery },
  { em }: Read,
): Promise<{ items: SentAlert[]; page: number; size: number; total: number }> {
  const [rows, total] = await em.findAndCount(Alert, keyOf(scope), {
    orderBy: { raisedAt: 'desc', id: 'asc' },
    limit: query.size,
    offset: (query.page - 1) * query.size,
  });
  const mails = await listMails(
    scope,
    rows.map((row) => row.id),
    em,
  );
  const items = rows.map(({ id, raisedAt, content }) => ({
    id,
    raisedAt: raisedAt.toISOString(),
    headline: content.headline,
    publicationNumber: content.publicationNumber,
    mails: mails.get(id) ?? [],
  }));
  return { items, page: query.page, size: query.size, total };
}

interface MailRow {
  alert_id: string;
  recipient_name: string;
  state: MailState;
  attempts: number;
  sent_at: Date | null;
  last_error: string | null;
}

async function listMails(
  scope: AlertScope,
  alertIds: string[],
  em: EntityManager,
): Promise<Map<string, SentAlert['mails']>> {
  const rows = await em.execute<MailRow[]>(
    `select alert_id, recipient_name, state, attempts, sent_at, last_error from mail_message
      where organisation_id = ? and alert_id = any(?::uuid[]) order by recipient_name, id`,
    [scope.organisationId, `{${alertIds.join(',')}}`],
  );
  const found = new Map<string, SentAlert['mails']>();
  for (const row of rows) {
    const mail = {
      name: row.recipient_name,
      state: row.state,
      attempts: row.attempts,
      sentAt: row.sent_at && new Date(row.sent_at).toISOString(),
      lastError: row.last_error,
    };
    found.set(row.alert_id, [...(found.get(row.alert_id) ?? []), mail]);
  }
  return found;
}

/** What an alert said, with the publication that it speaks of and the one that came before. */
export interface SpokenAlert {
  content: AlertContent;
  publicationId: string;
}

export async function getSpokenAlert(
  em: EntityManager,
  { organisationId, alertId }: { organisationId: string; alertId: string },
): Promise<SpokenAlert> {
  const alert = await em.findOneOrFail(Alert, { organisationId, id: alertId });
  return { content: alert.content, publicationId: alert.publicationId };
}
