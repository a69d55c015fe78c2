import type { EntityManager, LockMode } from '@mikro-orm/postgresql';
import type { CommandContext } from '../audit/record';
import type { StudyAction } from '../auth/permissions';
import type { StudyScope } from '../auth/scope';
import { calendarDay } from '../clock';
import { addMonths, lastEndedMonth, monthEnd, monthOf, monthsFrom } from '../dates';
import type { Site as StudyFileSite } from '../engine/types';
import { NotFoundError } from '../errors';
import type { Plan } from '../studies/schema';
import { Site } from '../../entities/site';
import { type LoggableSite, loggableMonths, monthState, runningMonth } from './rules';
import { type LogOverview, type MonthCounts, type MonthSheet, type OverviewQuery } from './schema';
import { type RevisionRecord, serialiseMonth, type SiteMonthRecord } from './serialise';

type Read = Pick<CommandContext, 'em' | 'clock'>;

/** The most corrections that a sheet brings along; older ones stay in the trail. */
const MOST_REVISIONS = 500;

export interface LoggedSite extends LoggableSite {
  id: string;
  code: string;
  name: string;
  city: string;
  country: string;
}

/** A site of the study by its code. To a coordinator every site but their own is not there. */
export async function getLoggedSite(
  scope: StudyScope<StudyAction>,
  em: EntityManager,
  code: string,
  lockMode?: LockMode,
): Promise<LoggedSite> {
  const site = await em.findOne(
    Site,
    { organisationId: scope.organisationId, studyId: scope.studyId, code },
    { lockMode, refresh: true },
  );
  if (!site || (scope.role === 'coordinator' && site.id !== scope.siteId))
    throw new NotFoundError(`There is no site ${code} in this study that you may see.`);
  const { id, name, city, country, activatedOn = null, closedOn = null, cap = null } = site;
  return { id, code, name, city, country, activatedOn, closedOn, cap };
}

export async function listSiteMonths(
  scope: StudyScope<StudyAction>,
  em: EntityManager,
  siteId: string,
): Promise<SiteMonthRecord[]> {
  return em.execute<SiteMonthRecord[]>(
    `select m.id, to_char(m.month, 'YYYY-MM') as month, m.screened, m.failed, m.randomised, m.events, m.withdrawn, m.version, m.logged_at, p.name as logged_by
       from site_month m join person p on p.id = m.logged_by
      where m.organisation_id = ? and m.study_id = ? and m.site_id = ? order by m.month`,
    [scope.organisationId, scope.studyId, siteId],
  );
}

/** Corrections, newest first: changes of a figure that had been saved, or that came with a reason. */
export async function listRevisions(
  scope: StudyScope<StudyAction>,
  em: EntityManager,
  siteId: string,
): Promise<RevisionRecord[]> {
  return em.execute<RevisionRecord[]>(
    `select r.site_month_id, r.field, r.old_value, r.new_value, r.reason_kind, r.reason, r.changed_at, p.name as changed_by
       from site_month_revision r join site_month m on m.organisation_id = r.organisation_id and m.id = r.site_month_id join person p on p.id = r.changed_by
      where r.organisation_id = ? and m.study_id = ? and m.site_id = ? and r.reason_kind is not null
      order by r.changed_at desc, r.field limit ${MOST_REVISIONS}`,
    [scope.organisationId, scope.studyId, siteId],
  );
}

export async function getMonthSheet(
  scope: StudyScope<'site-log:read'>,
  { params }: { params: { site: string } },
  { em, clock }: Read,
): Promise<MonthSheet> {
  const site = await getLoggedSite(scope, em, params.site);
  const today = calendarDay(clock.now());
  const records = await listSiteMonths(scope, em, site.id);
  const revisions = await listRevisions(scope, em, site.id);
  const months = loggableMonths(site, today).map((month) =>
    serialiseMonth(
      month,
      records.find((one) => one.month === month),
      revisions,
    ),
  );
  const { id: _id, ...shown } = site;
  return {
    site: shown,
    today,
    months,
    runningMonth: runningMonth(site, today),
    planned: await plannedAtSite(scope, em, site, today),
    mayLog: scope.role === 'coordinator',
  };
}

/** Randomised so far by month-end as the latest plan has it for a site of this country: a straight line after the ramp-up. */
async function plannedAtSite(
  scope: StudyScope<StudyAction>,
  em: EntityManager,
  site: LoggedSite,
  today: string,
): Promise<MonthSheet['planned']> {
  const [found] = await em.execute<{ plan: Plan }[]>(
    `select plan from plan_version where organisation_id = ? and study_id = ? order by number desc limit 1`,
    [scope.organisationId, scope.studyId],
  );
  if (!found || !site.activatedOn) return [];
  const { rate, countryRates, rampUp } = found.plan.enrolment;
  const perMonth = countryRates?.find((one) => one.country === site.country)?.meanPerMonth ?? rate.meanPerMonth;
  const ramp = rampUp ?? { months: 0, fraction: 1 };
  const ends = monthsFrom(monthOf(site.activatedOn), monthOf(today)).map(monthEnd);
  return ends.map((end) => {
    const age = (Date.parse(end) - Date.parse(site.activatedOn!) + 86_400_000) / (86_400_000 * 30.4375);
    const expected = perMonth * (age - (1 - ramp.fraction) * Math.min(age, ramp.months));
    return { monthEnd: end, randomised: Math.min(expected, site.cap ?? Number.POSITIVE_INFINITY) };
  });
}

interface OverviewRecord {
  id: string;
  code: string;
  name: string;
  city: string;
  country: string;
  activated_on: string;
  closed_on: string | null;
  cap: number | null;
  total: number;
}

/** Sites that are or were open, by code, with the state of each of the last months. A coordinator gets their own. */
export async function listLog(
  scope: StudyScope<'site-log:read'>,
  { query }: { query: OverviewQuery },
  { em, clock }: Read,
): Promise<LogOverview> {
  const today = calendarDay(clock.now());
  const last = lastEndedMonth(today);
  const months = monthsFrom(addMonths(last, 1 - query.months), last);
  const sites = await em.execute<OverviewRecord[]>(
    `select id, code, name, city, country, to_char(activated_on, 'YYYY-MM-DD') as activated_on, to_char(closed_on, 'YYYY-MM-DD') as closed_on, cap, count(*) over ()::int as total
       from site where organisation_id = ? and study_id = ? and activated_on is not null and (?::uuid is null or id = ?::uuid) order by code limit ? offset ?`,
    [scope.organisationId, scope.studyId, scope.siteId, scope.siteId, query.size, (query.page - 1) * query.size],
  );
  const logged = await monthsOfSites(
    scope,
    em,
    sites.map((site) => site.id),
  );
  const items = sites.map((site) => {
    const own = logged.get(site.id) ?? new Map<string, MonthCounts>();
    const open = loggableMonths({ activatedOn: site.activated_on, closedOn: site.closed_on, cap: site.cap }, today);
    const stateOf = (month: string) => (own.has(month) ? monthState(own.get(month)!) : 'missing');
    const states = open.map(stateOf);
    return {
      code: site.code,
      name: site.name,
      city: site.city,
      country: site.country,
      activatedOn: site.activated_on,
      closedOn: site.closed_on,
      randomised: [...own.values()].reduce((sum, counts) => sum + (counts.randomised ?? 0), 0),
      states: months.map((month) => (open.includes(month) ? stateOf(month) : 'closed')),
      missing: states.filter((state) => state === 'missing').length,
      incomplete: states.filter((state) => state === 'incomplete').length,
    };
  });
  return { months, items, page: query.page, size: query.size, total: sites[0]?.total ?? 0 };
}

async function monthsOfSites(
  scope: StudyScope<StudyAction>,
  em: EntityManager,
  siteIds: string[],
): Promise<Map<string, Map<string, MonthCounts>>> {
  const found = new Map<string, Map<string, MonthCounts>>();
  if (siteIds.length === 0) return found;
  const rows = await em.execute<(MonthCounts & { site_id: string; month: string })[]>(
    `select site_id, to_char(month, 'YYYY-MM') as month, screened, failed, randomised, events, withdrawn from site_month
      where organisation_id = ? and study_id = ? and site_id in (${siteIds.map(() => '?').join(', ')})`,
    [scope.organisationId, scope.studyId, ...siteIds],
  );
  for (const { site_id, month, ...counts } of rows) {
    const own = found.get(site_id) ?? new Map<string, MonthCounts>();
    own.set(month, counts);
    found.set(site_id, own);
  }
  return found;
}

export interface SiteEnrolment extends Pick<StudyFileSite, 'code' | 'country'> {
  activatedOn: string | null;
  closedOn: string | null;
  planned: { earliest: string; likely: string; latest: string } | null;
  cap: number | null;
  randomised: number;
  loggedThrough: string | null;
  unlogged: string[];
  monthly: { month: string; randomised: number }[];
}

interface EnrolmentRecord {
  id: string;
  code: string;
  country: string;
  planned: string[];
  activated_on: string | null;
  closed_on: string | null;
  cap: number | null;
}

/**
 * What the log knows of each site's enrolment up to a cut-off, in the study file's words: months whose last day is not
 * after the cut-off, and of those only the ones with a figure for "randomised". The rest are `unlogged`, never nought.
 * A site activated after the cut-off counts as still to open, on the day that is known by now.
 */
export async function loggedEnrolment(
  em: EntityManager,
  scope: StudyScope<StudyAction>,
  cutoffOn: string,
): Promise<SiteEnrolment[]> {
  const sites = await em.execute<EnrolmentRecord[]>(
    `select id, code, country, array_remove(array[to_char(planned_earliest, 'YYYY-MM-DD'), to_char(planned_likely, 'YYYY-MM-DD'), to_char(planned_latest, 'YYYY-MM-DD')], null) as planned,
            to_char(activated_on, 'YYYY-MM-DD') as activated_on, to_char(closed_on, 'YYYY-MM-DD') as closed_on, cap
       from site where organisation_id = ? and study_id = ? order by code`,
    [scope.organisationId, scope.studyId],
  );
  const rows = await em.execute<{ site_id: string; month: string; randomised: number }[]>(
    `select site_id, to_char(month, 'YYYY-MM') as month, randomised from site_month
      where organisation_id = ? and study_id = ? and randomised is not null and month + interval '1 month' - interval '1 day' <= ?::date order by month`,
    [scope.organisationId, scope.studyId, cutoffOn],
  );
  const bySite = new Map<string, typeof rows>();
  for (const row of rows) bySite.set(row.site_id, [...(bySite.get(row.site_id) ?? []), row]);
  return sites.map((site) => siteEnrolment(site, bySite.get(site.id) ?? [], cutoffOn));
}

function siteEnrolment(
  site: EnrolmentRecord,
  rows: { month: string; randomised: number }[],
  cutoffOn: string,
): SiteEnrolment {
  const [earliest, likely, latest] = site.planned;
  const window = earliest && likely && latest ? { earliest, likely, latest } : null;
  const shared = { code: site.code, country: site.country, cap: site.cap, closedOn: site.closed_on };
  const activatedOn = site.activated_on;
  if (!activatedOn || activatedOn > cutoffOn) {
    const known = activatedOn ? { earliest: activatedOn, likely: activatedOn, latest: activatedOn } : window;
    return {
      ...shared,
      activatedOn: null,
      planned: known,
      randomised: 0,
      loggedThrough: null,
      unlogged: [],
      monthly: [],
    };
  }
  const monthly = rows.map(({ month, randomised }) => ({ month, randomised }));
  const logged = new Set(monthly.map((row) => row.month));
  const lastLogged = monthly.at(-1)?.month;
  // Nothing logged yet: no month gives exposure, and the study file says so month by month.
  const through = lastLogged ?? monthOf(cutoffOn);
  return {
    ...shared,
    activatedOn,
    planned: window,
    randomised: monthly.reduce((sum, row) => sum + row.randomised, 0),
    loggedThrough: lastLogged ? monthEnd(lastLogged) : cutoffOn,
    unlogged: monthsFrom(monthOf(activatedOn), through).filter((month) => !logged.has(month)),
    monthly,
  };
}

export interface StudyTotals {
  monthEnd: string;
  randomised: number;
  events: number;
}

/** Randomised and events so far at each month-end up to the cut-off, over what is logged. */
export async function studyTotalsByMonth(
  em: EntityManager,
  scope: StudyScope<StudyAction>,
  cutoffOn: string,
): Promise<StudyTotals[]> {
  const rows = await em.execute<{ month: string; randomised: number; events: number }[]>(
    `select to_char(month, 'YYYY-MM') as month, coalesce(sum(randomised), 0)::int as randomised, coalesce(sum(events), 0)::int as events from site_month
      where organisation_id = ? and study_id = ? and month + interval '1 month' - interval '1 day' <= ?::date group by month order by month`,
    [scope.organisationId, scope.studyId, cutoffOn],
  );
  if (rows.length === 0) return [];
  const byMonth = new Map(rows.map((row) => [row.month, row]));
  let [randomised, events] = [0, 0];
  return monthsFrom(rows[0]!.month, rows.at(-1)!.month).map((month) => {
    randomised += byMonth.get(month)?.randomised ?? 0;
    events += byMonth.get(month)?.events ?? 0;
    return { monthEnd: monthEnd(month), randomised, events };
  });
}

/** A coordinator's own site; null for everybody else. */
export async function findOwnSiteCode(scope: StudyScope<'site-log:read'>, em: EntityManager): Promise<string | null> {
  if (!scope.siteId) return null;
  const site = await em.findOneOrFail(Site, {
    organisationId: scope.organisationId,
    studyId: scope.studyId,
    id: scope.siteId,
  });
  return site.code;
}
