import { randomUUID } from 'node:crypto';
import { LockMode } from '@mikro-orm/postgresql';
import { evaluateAfterLog } from '../alerts/commands';
import { type AuditChange, type CommandContext, recordAudit } from '../audit/record';
import type { StudyScope } from '../auth/scope';
import { calendarDay } from '../clock';
import { ConflictError, type FieldFault, InvalidError, NotFoundError } from '../errors';
import { formatLongMonth } from '../format';
import { SiteMonth, type SiteMonthRow } from '../../entities/site-month';
import { SiteMonthRevision } from '../../entities/site-month-revision';
import { getLoggedSite, listRevisions, listSiteMonths, type LoggedSite } from './queries';
import { countFaults, type LoggedMonth, monthFault, NO_COUNTS } from './rules';
import {
  LOG_FIELD_NAMES,
  LOG_FIELDS,
  type CorrectionReason,
  type CorrectMonthBody,
  type LogField,
  type LogMonthBody,
  type MonthCounts,
  type MonthEntry,
} from './schema';
import { countsOf, serialiseMonth } from './serialise';

type LogScope = StudyScope<'site-log:log'> | StudyScope<'site-log:correct'>;

interface MonthInput<B> {
  params: { site: string; month: string };
  body: B;
}

interface Change {
  field: LogField;
  old: number | null;
  new: number | null;
}

/** First figures of a month. The same figures again change nothing; a figure that stands already takes a correction. */
export async function logMonth(
  scope: StudyScope<'site-log:log'>,
  { params, body }: MonthInput<LogMonthBody>,
  context: CommandContext,
): Promise<MonthEntry> {
  const { site, row } = await openMonth(scope, params, context);
  const changes: Change[] = [];
  const standing: LogField[] = [];
  for (const field of LOG_FIELDS) {
    const [old, value] = [row?.[field] ?? null, body.cells[field]];
    if (value === undefined || value === old) continue;
    if (old === null) changes.push({ field, old, new: value });
    else standing.push(field);
  }
  if (standing.length > 0)
    await refuseStanding(
      scope,
      { site, row: row!, standing, stale: body.version !== row!.version, month: params.month },
      context,
    );
  return saveMonth(scope, { site, row, month: params.month, changes, reason: null, source: body.source }, context);
}

/** Changes figures that were saved, with a reason; the old ones are kept. */
export async function correctMonth(
  scope: StudyScope<'site-log:correct'>,
  { params, body }: MonthInput<CorrectMonthBody>,
  context: CommandContext,
): Promise<MonthEntry> {
  const { site, row } = await openMonth(scope, params, context);
  if (!row) throw new NotFoundError(`Nothing is logged for ${formatLongMonth(params.month)} yet. Log it first.`);
  const asked = LOG_FIELDS.flatMap((field) => {
    const cell = body.cells[field];
    return cell && cell.to !== row[field] ? [{ field, old: cell.from, new: cell.to }] : [];
  });
  if (asked.some((change) => row[change.field] !== change.old)) {
    throw new ConflictError(
      `Someone else changed ${formatLongMonth(params.month)} while you were working on it.`,
      await entryOf(scope, site, params.month, context),
    );
  }
  return saveMonth(
    scope,
    {
      site,
      row,
      month: params.month,
      changes: asked,
      reason: { kind: body.reasonKind, text: body.reason },
      source: body.source,
    },
    context,
  );
}

/** The site's row is locked: its sums are judged and two first saves of one month meet one after the other. */
async function openMonth(
  scope: LogScope,
  params: { site: string; month: string },
  { em, clock }: CommandContext,
): Promise<{ site: LoggedSite; row: SiteMonthRow | null }> {
  const site = await getLoggedSite(scope, em, params.site, LockMode.PESSIMISTIC_WRITE);
  const fault = monthFault(site, params.month, calendarDay(clock.now()));
  if (fault) throw new InvalidError([{ pointer: '/month', detail: fault }]);
  const row = await em.findOne(SiteMonth, {
    organisationId: scope.organisationId,
    siteId: site.id,
    month: `${params.month}-01`,
  });
  return { site, row };
}

interface Standing {
  site: LoggedSite;
  row: SiteMonthRow;
  standing: readonly LogField[];
  stale: boolean;
  month: string;
}

async function refuseStanding(
  scope: LogScope,
  { site, row, standing, stale, month }: Standing,
  context: CommandContext,
): Promise<never> {
  if (stale)
    throw new ConflictError(
      `Someone else saved ${formatLongMonth(month)} while you were typing.`,
      await entryOf(scope, site, month, context),
    );
  throw new InvalidError(
    standing.map((field) => ({
      pointer: `/cells/${field}`,
      detail: `${LOG_FIELD_NAMES[field]} is saved as ${row[field]}. Correct it, with a reason.`,
    })),
  );
}

interface Save {
  site: LoggedSite;
  row: SiteMonthRow | null;
  month: string;
  changes: readonly Change[];
  reason: { kind: CorrectionReason; text: string } | null;
  source: LogMonthBody['source'];
}

async function saveMonth(scope: LogScope, save: Save, context: CommandContext): Promise<MonthEntry> {
  const { site, month, changes } = save;
  if (changes.length === 0) return entryOf(scope, site, month, context);
  await judge(scope, save, context);
  const row = write(scope, save, context);
  const { organisationId, actor } = scope;
  for (const change of changes) {
    context.em.persist(
      context.em.create(SiteMonthRevision, {
        id: randomUUID(),
        organisationId,
        siteMonthId: row.id,
        field: change.field,
        oldValue: change.old,
        newValue: change.new,
        reasonKind: save.reason?.kind ?? null,
        reason: save.reason?.text ?? null,
        changedAt: context.clock.now(),
        changedBy: actor.personId,
      }),
    );
  }
  await context.em.flush();
  await recordAudit({ ...context, source: save.source }, scope, {
    action: scope.action,
    recordType: 'site_month',
    recordId: `${site.code} ${month}`,
    changes: changes.map((change): AuditChange => ({ ...change })),
    reason: save.reason ? `${save.reason.kind}: ${save.reason.text}` : null,
  });
  await evaluateAfterLog(context, scope);
  return entryOf(scope, site, month, context);
}

function write(
  scope: LogScope,
  { site, row, month, changes, reason }: Save,
  { em, clock }: CommandContext,
): SiteMonthRow {
  const counts: MonthCounts = { ...(row ? countsOf(row) : NO_COUNTS) };
  for (const change of changes) counts[change.field] = change.new;
  // A correction leaves who logged the month first, and when: its own author stands in the revision.
  const logged = reason ? {} : { loggedAt: clock.now(), loggedBy: scope.actor.personId };
  if (row) return Object.assign(row, counts, logged);
  const made = em.create(SiteMonth, {
    id: randomUUID(),
    organisationId: scope.organisationId,
    studyId: scope.studyId,
    siteId: site.id,
    month: `${month}-01`,
    ...counts,
    loggedAt: clock.now(),
    loggedBy: scope.actor.personId,
  });
  em.persist(made);
  return made;
}

/** Refuses what the site's sums can't hold, every cell at once. */
async function judge(scope: LogScope, { site, month, changes }: Save, { em }: CommandContext): Promise<void> {
  const before: LoggedMonth[] = (await listSiteMonths(scope, em, site.id)).map((record) => ({
    month: record.month,
    ...countsOf(record),
  }));
  const row = { ...(before.find((one) => one.month === month) ?? { month, ...NO_COUNTS }) };
  for (const change of changes) row[change.field] = change.new;
  const after = [...before.filter((one) => one.month !== month), row];
  const faults: FieldFault[] = countFaults(before, after, month, site).map(({ field, detail }) => ({
    pointer: `/cells/${field}`,
    detail,
  }));
  if (faults.length > 0) throw new InvalidError(faults);
}

async function entryOf(scope: LogScope, site: LoggedSite, month: string, { em }: CommandContext): Promise<MonthEntry> {
  const record = (await listSiteMonths(scope, em, site.id)).find((one) => one.month === month);
  return serialiseMonth(month, record, await listRevisions(scope, em, site.id));
}
