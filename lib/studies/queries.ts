import type { EntityManager } from '@mikro-orm/postgresql';
import type { CommandContext } from '../audit/record';
import { roleMay, type StudyAction } from '../auth/permissions';
import type { StudyScope } from '../auth/scope';
import { calendarDay } from '../clock';
import { lastEndedMonth } from '../dates';
import { NotFoundError } from '../errors';
import { formatCount, formatDate, formatQuantity } from '../format';
import { Person } from '../../entities/person';
import { PlanDraft, type PlanDraftRow } from '../../entities/plan-draft';
import { PlanVersion, type PlanVersionRow } from '../../entities/plan-version';
import { Study } from '../../entities/study';
import { comparePlans, sameValue } from './rules';
import {
  PLAN_SECTIONS,
  type PlanComparison,
  type PlanSite,
  type PlanVersionView,
  type PlanView,
  type StudyFrame,
} from './schema';
import { isSaved, sectionStates, serialiseVersion, serialiseVersionHead } from './serialise';

type Read = Pick<CommandContext, 'em' | 'clock'>;
type PlanScope = StudyScope<'plan:read'> | StudyScope<'plan:save'>;

/** As many versions as a page lists; every one of them can be read and compared by its number. */
const MOST_VERSIONS = 100;

export function findCurrentVersion(scope: PlanScope, em: EntityManager): Promise<PlanVersionRow | null> {
  return em.findOne(
    PlanVersion,
    { organisationId: scope.organisationId, studyId: scope.studyId },
    { orderBy: { number: 'desc' } },
  );
}

export async function getPlan(scope: StudyScope<'plan:read'>, _input: unknown, { em, clock }: Read): Promise<PlanView> {
  const key = { organisationId: scope.organisationId, studyId: scope.studyId };
  const study = await em.findOneOrFail(Study, { id: scope.studyId, organisationId: scope.organisationId });
  const versions = await em.find(PlanVersion, key, { orderBy: { number: 'desc' }, limit: MOST_VERSIONS });
  const draft = await em.findOne(PlanDraft, key);
  const names = await namesOf(em, [...versions.map((row) => row.createdBy), ...(draft ? [draft.updatedBy] : [])]);
  const nameOf = (id: string): string => names.get(id) ?? 'someone who has left';
  const current = versions[0] ?? null;
  const pending = draft !== null && differs(draft, current);
  return {
    study: { code: study.code, title: study.title, sponsorName: study.sponsorName },
    maySave: roleMay(scope.role, 'plan:save'),
    current: current && serialiseVersion(current, nameOf(current.createdBy)),
    sections: sectionStates(draft, current),
    saved: PLAN_SECTIONS.filter((section) => isSaved(draft, current, section)),
    draft: pending ? { savedAt: draft.updatedAt.toISOString(), savedBy: nameOf(draft.updatedBy) } : null,
    versions: versions.map((row) => serialiseVersionHead(row, nameOf(row.createdBy))),
    hasRun: await hasRun(scope, em),
    sites: await listPlanSites(scope, em),
    today: calendarDay(clock.now()),
  };
}

function differs(draft: PlanDraftRow, current: PlanVersionRow | null): boolean {
  return PLAN_SECTIONS.some((section) => !sameValue(draft.sections[section], current?.plan[section]));
}

async function namesOf(em: EntityManager, ids: readonly string[]): Promise<Map<string, string>> {
  const people = await em.find(Person, { id: { $in: [...new Set(ids)] } });
  return new Map(people.map((person) => [person.id, person.name]));
}

/** Once a run exists, a new version needs a reason: readers of forecasts will ask why the date moved. */
export async function hasRun(scope: PlanScope, em: EntityManager): Promise<boolean> {
  const rows = await em.execute(`select 1 from forecast_run where organisation_id = ? and study_id = ? limit 1`, [
    scope.organisationId,
    scope.studyId,
  ]);
  return rows.length > 0;
}

/** The study file holds at most 5,000 sites. */
async function listPlanSites(scope: StudyScope<'plan:read'>, em: EntityManager): Promise<PlanSite[]> {
  return em.execute<PlanSite[]>(
    `select code, country, to_char(coalesce(planned_earliest, activated_on), 'YYYY-MM-DD') as earliest, to_char(coalesce(planned_likely, activated_on), 'YYYY-MM-DD') as likely,
            to_char(coalesce(planned_latest, activated_on), 'YYYY-MM-DD') as latest, cap
       from site where organisation_id = ? and study_id = ? and coalesce(planned_likely, activated_on) is not null order by code limit 5000`,
    [scope.organisationId, scope.studyId],
  );
}

export async function getPlanVersion(
  scope: StudyScope<'plan:read'>,
  { params }: { params: { number: number } },
  { em }: Pick<CommandContext, 'em'>,
): Promise<PlanVersionView> {
  const row = await versionRow(scope, params.number, em);
  const names = await namesOf(em, [row.createdBy]);
  return serialiseVersion(row, names.get(row.createdBy) ?? 'someone who has left');
}

export async function comparePlanVersions(
  scope: StudyScope<'plan:read'>,
  { query }: { query: { from: number; to: number } },
  { em }: Pick<CommandContext, 'em'>,
): Promise<PlanComparison> {
  const from = await getPlanVersion(scope, { params: { number: query.from } }, { em });
  const to = await getPlanVersion(scope, { params: { number: query.to } }, { em });
  const { plan: before, ...fromHead } = from;
  const { plan: after, ...toHead } = to;
  return { from: fromHead, to: toHead, differences: comparePlans(before, after) };
}

async function versionRow(scope: StudyScope<'plan:read'>, number: number, em: EntityManager): Promise<PlanVersionRow> {
  const row = await em.findOne(PlanVersion, { organisationId: scope.organisationId, studyId: scope.studyId, number });
  if (!row) throw new NotFoundError(`The plan has no version ${number}.`);
  return row;
}

interface FrameCounts {
  plan_version: number | null;
  has_draft: boolean;
  sites: number;
  sites_open: number;
  months_due: number;
  last_cut: string | null;
  last_run: number | null;
  published: number;
  rules: number;
  people: number;
}

/* One row, whatever the study's size. A month is due once it is over, from the site's activation to its closure. */
const FRAME_SQL = `
  select (select max(number) from plan_version where organisation_id = ? and study_id = ?) as plan_version,
         exists (select 1 from plan_draft where organisation_id = ? and study_id = ?) as has_draft,
         (select count(*)::int from site where organisation_id = ? and study_id = ?) as sites,
         (select count(*)::int from site where organisation_id = ? and study_id = ? and activated_on <= ?::date and (closed_on is null or closed_on >= ?::date)) as sites_open,
         (select coalesce(sum(greatest(0, due.months - due.logged)), 0)::int from (
            select (extract(year from last.month) - extract(year from s.activated_on)) * 12 + extract(month from last.month) - extract(month from s.activated_on) + 1 as months,
                   (select count(*) from site_month m where m.organisation_id = s.organisation_id and m.site_id = s.id and m.month <= last.month
                       and num_nulls(m.screened, m.failed, m.randomised, m.events, m.withdrawn) < 5) as logged
              from site s cross join lateral (select least(?::date, date_trunc('month', s.closed_on)::date) as month) last
             where s.organisation_id = ? and s.study_id = ? and s.activated_on is not null) due) as months_due,
         (select to_char(max(cutoff_on), 'YYYY-MM-DD') from data_cut where organisation_id = ? and study_id = ?) as last_cut,
         (select max(number) from forecast_run where organisation_id = ? and study_id = ?) as last_run,
         (select count(*)::int from publication where organisation_id = ? and study_id = ?) as published,
         (select count(*)::int from alert_rule where organisation_id = ? and study_id = ? and is_active) as rules,
         (select count(*)::int from study_member where organisation_id = ? and study_id = ?) as people`;

interface RailSection {
  section: string;
  label: string;
  action: StudyAction;
  value: (counts: FrameCounts) => string | null;
}

const RAIL: readonly RailSection[] = [
  {
    section: 'plan',
    label: 'Plan',
    action: 'plan:read',
    value: ({ plan_version, has_draft }) => (plan_version ? `version ${plan_version}` : has_draft ? 'draft' : null),
  },
  {
    section: 'sites',
    label: 'Sites',
    action: 'sites:read',
    value: ({ sites, sites_open }) => (sites > 0 ? `${formatCount(sites_open)} of ${formatCount(sites)}` : null),
  },
  {
    section: 'log',
    label: 'Site log',
    action: 'site-log:read',
    value: ({ months_due }) => (months_due > 0 ? `${formatCount(months_due)} due` : null),
  },
  {
    section: 'data-cuts',
    label: 'Data cuts',
    action: 'data-cuts:read',
    value: ({ last_cut }) => last_cut && formatDate(last_cut),
  },
  {
    section: 'forecasts',
    label: 'Forecasts',
    action: 'forecasts:read',
    value: ({ last_run }) => (last_run ? `run ${last_run}` : null),
  },
  {
    section: 'timeline',
    label: 'Timeline',
    action: 'publications:read',
    value: ({ published }) => (published > 0 ? `${published} published` : null),
  },
  {
    section: 'alerts',
    label: 'Alerts',
    action: 'alerts:read',
    value: ({ rules }) => (rules > 0 ? formatQuantity(rules, 'rule') : null),
  },
  { section: 'people', label: 'People', action: 'people:read', value: ({ people }) => formatCount(people) },
  { section: 'audit', label: 'Audit', action: 'audit:read', value: () => null },
];

/** What stands around every page of a study, as far as the role sees it. */
export async function getStudyFrame(
  scope: StudyScope<'study:read'>,
  _input: unknown,
  { em, clock }: Read,
): Promise<StudyFrame> {
  const study = await em.findOneOrFail(Study, { id: scope.studyId, organisationId: scope.organisationId });
  const today = calendarDay(clock.now());
  const key = [scope.organisationId, scope.studyId];
  const pairs = (count: number): string[] => Array.from({ length: count }, () => key).flat();
  const [counts] = await em.execute<[FrameCounts]>(FRAME_SQL, [
    ...pairs(4),
    today,
    today,
    `${lastEndedMonth(today)}-01`,
    ...pairs(6),
  ]);
  return {
    code: study.code,
    title: study.title,
    sponsorName: study.sponsorName,
    role: scope.role,
    isDemonstration: scope.isDemonstration,
    rail: RAIL.filter(({ action }) => roleMay(scope.role, action)).map(({ section, label, value }) => ({
      section,
      label,
      value: value(counts),
      caution: section === 'log' && counts.months_due > 0,
    })),
  };
}

/** Where a role's work begins: a statistician without a plan sets it up first. */
export async function findFrontDoor(scope: StudyScope<'study:read'>, em: EntityManager): Promise<string> {
  if (scope.role === 'coordinator') return 'log';
  if (scope.role === 'sponsor') return 'timeline';
  if (scope.role === 'manager') return 'sites';
  if (scope.role === 'owner') return 'people';
  const planned = await em.count(PlanVersion, { organisationId: scope.organisationId, studyId: scope.studyId });
  return planned > 0 ? 'forecasts' : 'plan';
}
