import { randomUUID } from 'node:crypto';
import { AlertRule, type AlertRuleRow } from '../../entities/alert-rule';
import type { PublicationRow } from '../../entities/publication';
import { changedFields, type CommandContext, recordAudit } from '../audit/record';
import type { StudyAction } from '../auth/permissions';
import type { StudyScope } from '../auth/scope';
import { calendarDay } from '../clock';
import { queueMail } from '../email/commands';
import { ConflictError, type FieldFault, InvalidError, NotFoundError } from '../errors';
import { findLastPublication, listDateHistory } from '../publications/queries';
import { nameOfMilestone } from '../publications/rules';
import {
  countRaised,
  findLastAlert,
  listActiveRules,
  listMilestones,
  listReaders,
  listRecipients,
  MOST_RULES,
} from './queries';
import { headlineOf, newsWords, ruleSpeaks, type RuleSituation } from './rules';
import type { AddAlertRuleBody, AlertContent, AlertRuleView, ChangeAlertRuleBody } from './schema';
import { serialiseRule } from './serialise';

type ChangeScope = StudyScope<'alerts:change'>;

export async function addAlertRule(
  scope: ChangeScope,
  { body }: { body: AddAlertRuleBody },
  context: CommandContext,
): Promise<AlertRuleView> {
  const { em, clock } = context;
  await refuseUnknown(scope, body, null, context);
  const count = await em.count(AlertRule, { organisationId: scope.organisationId, studyId: scope.studyId });
  if (count >= MOST_RULES)
    throw new InvalidError([{ pointer: '', detail: `A study has at most ${MOST_RULES} rules.` }]);
  const rule = em.create(AlertRule, {
    id: randomUUID(),
    organisationId: scope.organisationId,
    studyId: scope.studyId,
    ...body,
    createdAt: clock.now(),
    createdBy: scope.actor.personId,
  });
  em.persist(rule);
  await em.flush();
  await audit(scope, 'alerts:add-rule', rule.id, changedFields({}, { ...body }), context);
  return view(scope, rule, context);
}

export async function changeAlertRule(
  scope: ChangeScope,
  { params, body }: { params: { id: string }; body: ChangeAlertRuleBody },
  context: CommandContext,
): Promise<AlertRuleView> {
  const rule = await lockRule(scope, params.id, context);
  const { version, ...wanted } = body;
  if (rule.version !== version)
    throw new ConflictError(
      'Someone else changed this rule while you were working on it.',
      await view(scope, rule, context),
    );
  await refuseUnknown(scope, wanted, rule, context);
  const before = {
    milestoneCode: rule.milestoneCode,
    condition: rule.condition,
    recipients: rule.recipients,
    isActive: rule.isActive,
  };
  const changes = changedFields(before, wanted);
  if (changes.length === 0) return view(scope, rule, context);
  Object.assign(rule, wanted);
  await context.em.flush();
  await audit(scope, 'alerts:change-rule', rule.id, changes, context);
  return view(scope, rule, context);
}

/** A rule that has spoken stays with what it said; it can be switched off. */
export async function deleteAlertRule(
  scope: ChangeScope,
  { params, query }: { params: { id: string }; query: { version: number } },
  context: CommandContext,
): Promise<{ id: string }> {
  const rule = await lockRule(scope, params.id, context);
  if (rule.version !== query.version)
    throw new ConflictError(
      'Someone else changed this rule while you were working on it.',
      await view(scope, rule, context),
    );
  if ((await countRaised(scope, context.em)).has(rule.id))
    throw new ConflictError(
      'This rule has told people something, so it is kept. Switch it off instead.',
      await view(scope, rule, context),
    );
  const { id, milestoneCode, condition, recipients } = rule;
  context.em.remove(rule);
  await context.em.flush();
  const changes = [
    { field: 'milestoneCode', old: milestoneCode, new: null },
    { field: 'condition', old: condition, new: null },
    { field: 'recipients', old: recipients, new: null },
  ];
  await audit(scope, 'alerts:delete-rule', id, changes, context);
  return { id };
}

async function lockRule(scope: ChangeScope, id: string, { em }: CommandContext): Promise<AlertRuleRow> {
  await em.execute(`select 1 from alert_rule where organisation_id = ? and id = ? for update`, [
    scope.organisationId,
    id,
  ]);
  const rule = await em.findOne(
    AlertRule,
    { organisationId: scope.organisationId, studyId: scope.studyId, id },
    { refresh: true },
  );
  if (!rule) throw new NotFoundError('There is no such rule. Somebody may have deleted it.');
  return rule;
}

/** What a rule had before it may keep: a milestone that the plan dropped, a person who has left. */
async function refuseUnknown(
  scope: ChangeScope,
  { milestoneCode, recipients }: AddAlertRuleBody,
  had: AlertRuleRow | null,
  { em }: CommandContext,
): Promise<void> {
  const faults: FieldFault[] = [];
  const milestones = await listMilestones(scope, em);
  if (milestoneCode !== had?.milestoneCode && !milestones.some(({ code }) => code === milestoneCode))
    faults.push({
      pointer: '/milestoneCode',
      detail: `The plan has no milestone ${milestoneCode}. Choose one of its milestones.`,
    });
  const readers = new Set((await listReaders(scope, em)).map(({ id }) => id));
  for (const [place, id] of recipients.personIds.entries()) {
    if (!readers.has(id) && !had?.recipients.personIds.includes(id))
      faults.push({
        pointer: `/recipients/personIds/${place}`,
        detail: 'This person reads no publications of the study. Choose one of its readers.',
      });
  }
  if (faults.length > 0) throw new InvalidError(faults);
}

async function view(scope: ChangeScope, rule: AlertRuleRow, { em }: CommandContext): Promise<AlertRuleView> {
  const raised = (await countRaised(scope, em)).get(rule.id) ?? 0;
  return serialiseRule(rule, await listMilestones(scope, em), raised);
}

async function audit(
  scope: ChangeScope,
  action: string,
  recordId: string,
  changes: ReturnType<typeof changedFields>,
  context: CommandContext,
): Promise<void> {
  await recordAudit(context, scope, { action, recordType: 'alert_rule', recordId, changes });
}

/** After a publication: every rule of the study looks at it. Called in the transaction that publishes. */
export async function evaluateAlerts(
  context: CommandContext,
  scope: StudyScope<StudyAction>,
  publication: PublicationRow,
): Promise<void> {
  for (const rule of await listActiveRules(scope, context.em)) await evaluate(context, scope, rule, publication);
}

/**
 * After a month was logged, in its transaction. The month's figures are not looked at: whoever is told reads published
 * figures only, and a count that nobody has published must not leave by mail. What has changed is the day. A milestone
 * comes nearer as time passes, so the rules about nearness look again at the publication that stands.
 */
export async function evaluateAfterLog(context: CommandContext, scope: StudyScope<StudyAction>): Promise<void> {
  const rules = (await listActiveRules(scope, context.em)).filter((rule) => rule.condition.kind === 'nears');
  if (rules.length === 0) return;
  const publication = await findLastPublication(scope, context.em);
  if (!publication) return;
  for (const rule of rules) await evaluate(context, scope, rule, publication);
}

async function evaluate(
  context: CommandContext,
  scope: StudyScope<StudyAction>,
  rule: AlertRuleRow,
  publication: PublicationRow,
): Promise<void> {
  const situation = await situationOf(context, scope, rule, publication);
  if (!situation || !ruleSpeaks(rule.condition, situation)) return;
  const content: AlertContent = {
    milestoneCode: rule.milestoneCode,
    milestoneName: nameOfMilestone(situation.current.milestone),
    condition: rule.condition,
    publicationNumber: publication.number,
    headline: headlineOf(rule.condition, situation),
  };
  const alertId = await raise(context, scope, { rule, publication, content });
  if (!alertId) return;
  const recipients = await listRecipients(scope, rule.recipients, context.em);
  for (const { name, email } of recipients) {
    await queueMail(context, {
      organisationId: scope.organisationId,
      studyId: scope.studyId,
      alertId,
      recipient: email,
      recipientName: name,
      subject: `${scope.studyCode}: ${newsWords(rule.condition, situation)}`,
      template: { kind: 'alert', alertId, publicationId: publication.id },
    });
  }
  await recordAudit(
    context,
    // The rule spoke, not the person whose act made it look.
    { actor: null, role: 'alert rule', organisationId: scope.organisationId, studyId: scope.studyId },
    {
      action: 'alerts:raise',
      recordType: 'alert',
      recordId: alertId,
      changes: [
        { field: 'headline', old: null, new: content.headline },
        { field: 'recipients', old: null, new: recipients.length },
      ],
    },
  );
}

/** Null where the publication does not know the rule's milestone. */
async function situationOf(
  { em, clock }: CommandContext,
  scope: StudyScope<StudyAction>,
  rule: AlertRuleRow,
  publication: PublicationRow,
): Promise<RuleSituation | null> {
  const lastAlert = await findLastAlert(rule, em);
  const length = lastAlert === null ? 2 : Math.max(2, publication.number - lastAlert + 1);
  const history = await listDateHistory(scope, { code: rule.milestoneCode, upTo: publication.number, length }, em);
  const current = history.pop();
  if (!current || current.number !== publication.number) return null;
  return { current, before: history.reverse(), lastAlert, today: calendarDay(clock.now()) };
}

/** Null where the rule has spoken of this publication already, in this transaction's past or beside it. */
async function raise(
  { em, clock }: CommandContext,
  { organisationId, studyId }: StudyScope<StudyAction>,
  { rule, publication, content }: { rule: AlertRuleRow; publication: PublicationRow; content: AlertContent },
): Promise<string | null> {
  const [made] = await em.execute<{ id: string }[]>(
    `insert into alert (id, organisation_id, study_id, rule_id, publication_id, content, raised_at) values (?, ?, ?, ?, ?, ?::jsonb, ?)
     on conflict (organisation_id, rule_id, publication_id) do nothing returning id`,
    [randomUUID(), organisationId, studyId, rule.id, publication.id, JSON.stringify(content), clock.now()],
  );
  return made?.id ?? null;
}
