import type { EntityManager } from '@mikro-orm/postgresql';
import type { CommandContext } from '../audit/record';
import { type ActingRole, ROLE_NAMES, roleMay } from '../auth/permissions';
import type { PersonScope } from '../auth/scope';
import { calendarDay } from '../clock';
import { lastEndedMonth } from '../dates';
import { setTenancy } from '../db/transaction';
import type { Milestone, MilestoneForecast } from '../engine/types';
import type { RunFailure, RunStatus } from '../forecasts/schema';
import { inOrderOfTime, isStale, nextPlanned, soonestOf, sortStudies, standingOf } from './rules';
import {
  type Portfolio,
  type PortfolioMilestone,
  type PortfolioQuery,
  type PortfolioStudy,
  STUDIES_PER_PAGE,
} from './schema';

type Read = Pick<CommandContext, 'em' | 'clock'>;

interface OwnStudy {
  organisation_id: string;
  organisation_name: string;
  is_demonstration: boolean;
  study_id: string;
  code: string;
  title: string;
  sponsor_name: string;
  role: ActingRole;
  site_id: string | null;
}

/** Nobody works on more; the page says how many there are. */
const MOST_STUDIES = 2000;

/** Studies of the person, found through their own memberships; a study role comes before ownership. */
async function ownStudies({ actor }: PersonScope, em: EntityManager): Promise<OwnStudy[]> {
  await setTenancy(em, { personId: actor.personId });
  return em.execute<OwnStudy[]>(
    `select o.id as organisation_id, o.name as organisation_name, o.is_demonstration, s.id as study_id, s.code, s.title, s.sponsor_name,
            coalesce(m.role, 'owner') as role, m.site_id
       from study s join organisation o on o.id = s.organisation_id
       left join study_member m on m.organisation_id = s.organisation_id and m.study_id = s.id and m.person_id = ?
       left join organisation_member w on w.organisation_id = s.organisation_id and w.person_id = ? and w.role = 'owner'
      where m.id is not null or w.id is not null order by s.code limit ${MOST_STUDIES}`,
    [actor.personId, actor.personId],
  );
}

/** What each role may see of each of its studies: a publication, the plan's dates, one's own site, or the name alone. */
export async function listStudies(
  scope: PersonScope,
  { query }: { query: PortfolioQuery },
  { em, clock }: Read,
): Promise<Portfolio> {
  const today = calendarDay(clock.now());
  const own = await ownStudies(scope, em);
  const word = query.search?.toLowerCase();
  const found = word
    ? own.filter((study) => `${study.code}\n${study.title}\n${study.sponsor_name}`.toLowerCase().includes(word))
    : own;
  const studies: PortfolioStudy[] = [];
  for (const [organisationId, group] of groupByOrganisation(found)) {
    await setTenancy(em, { organisationId, personId: scope.actor.personId });
    studies.push(...(await describe(organisationId, group, em, today)));
  }
  await setTenancy(em, { personId: scope.actor.personId });
  const ordered = sortStudies(studies, query.order);
  const [first] = sortStudies(studies, 'date');
  const soonest = first ? soonestOf(first.milestones) : null;
  return {
    items: ordered.slice((query.page - 1) * STUDIES_PER_PAGE, query.page * STUDIES_PER_PAGE),
    page: query.page,
    size: STUDIES_PER_PAGE,
    total: ordered.length,
    all: own.length,
    today,
    soonest: first && soonest ? { code: first.code, milestone: soonest } : null,
    stopped: studies.filter((study) => study.run?.status === 'failed').length,
    stale: studies.filter((study) => study.published && isStale(study.published.dataCutoff, today)).length,
  };
}

function groupByOrganisation(studies: readonly OwnStudy[]): Map<string, OwnStudy[]> {
  const groups = new Map<string, OwnStudy[]>();
  for (const study of studies) groups.set(study.organisation_id, [...(groups.get(study.organisation_id) ?? []), study]);
  return groups;
}

interface PublishedRow {
  study_id: string;
  number: number;
  run_number: number;
  published_on: string;
  data_cutoff: string;
  cautions: number;
  observed: { randomised: number; events: number | null };
  milestones: MilestoneForecast[];
}

interface PlanRow {
  study_id: string;
  saved_on: string;
  milestones: Milestone[];
}

interface RunRow {
  study_id: string;
  number: number;
  status: RunStatus;
  failure: RunFailure | null;
}

interface SiteRow {
  id: string;
  code: string;
  name: string;
  city: string;
  due: number;
}

const marks = (values: readonly unknown[]): string => values.map(() => '?').join(', ');

/* The weekly densities stay where they are: a bracket needs none, and they are most of a publication's weight. */
const PUBLISHED_SQL = (count: string): string => `
  select distinct on (p.study_id) p.study_id, p.number, (p.content->>'runNumber')::int as run_number, to_char(p.published_at at time zone 'UTC', 'YYYY-MM-DD') as published_on,
         p.content->>'dataCutoff' as data_cutoff, coalesce(jsonb_array_length(p.content->'cautions'), 0) as cautions, p.content->'observed' as observed,
         (select coalesce(jsonb_agg((m - 'density') || '{"density": []}'::jsonb), '[]'::jsonb) from jsonb_array_elements(p.content->'milestones') m) as milestones
    from publication p where p.organisation_id = ? and p.study_id in (${count}) order by p.study_id, p.number desc`;

const PLAN_SQL = (count: string): string => `
  select distinct on (study_id) study_id, to_char(created_at at time zone 'UTC', 'YYYY-MM-DD') as saved_on, plan->'milestones' as milestones
    from plan_version where organisation_id = ? and study_id in (${count}) order by study_id, number desc`;

const RUN_SQL = (count: string): string => `
  select distinct on (study_id) study_id, number, status, failure from forecast_run where organisation_id = ? and study_id in (${count}) order by study_id, number desc`;

const SITE_SQL = (count: string): string => `
  select s.id, s.code, s.name, s.city, greatest(0, coalesce((extract(year from last.month) - extract(year from s.activated_on)) * 12 + extract(month from last.month) - extract(month from s.activated_on) + 1
         - (select count(*) from site_month m where m.organisation_id = s.organisation_id and m.site_id = s.id and m.month <= last.month
              and num_nulls(m.screened, m.failed, m.randomised, m.events, m.withdrawn) < 5), 0))::int as due
    from site s cross join lateral (select least(?::date, date_trunc('month', s.closed_on)::date) as month) last
   where s.organisation_id = ? and s.id in (${count})`;

async function describe(
  organisationId: string,
  group: readonly OwnStudy[],
  em: EntityManager,
  today: string,
): Promise<PortfolioStudy[]> {
  const rowsFor = async <T extends { study_id: string }>(
    sql: (count: string) => string,
    action: Parameters<typeof roleMay>[1],
  ): Promise<Map<string, T>> => {
    const ids = group.filter((study) => roleMay(study.role, action)).map((study) => study.study_id);
    if (ids.length === 0) return new Map();
    const rows = await em.execute<T[]>(sql(marks(ids)), [organisationId, ...ids]);
    return new Map(rows.map((row) => [row.study_id, row]));
  };
  const published = await rowsFor<PublishedRow>(PUBLISHED_SQL, 'publications:read');
  const plans = await rowsFor<PlanRow>(PLAN_SQL, 'plan:read');
  const runs = await rowsFor<RunRow>(RUN_SQL, 'forecasts:read');
  const sites = await ownSites(organisationId, group, em, today);
  return group.map((study) =>
    portfolioRow(study, {
      published: published.get(study.study_id),
      plan: plans.get(study.study_id),
      run: runs.get(study.study_id),
      site: study.site_id ? sites.get(study.site_id) : undefined,
    }),
  );
}

async function ownSites(
  organisationId: string,
  group: readonly OwnStudy[],
  em: EntityManager,
  today: string,
): Promise<Map<string, SiteRow>> {
  const ids = group.flatMap((study) => (study.site_id ? [study.site_id] : []));
  if (ids.length === 0) return new Map();
  const rows = await em.execute<SiteRow[]>(SITE_SQL(marks(ids)), [
    `${lastEndedMonth(today)}-01`,
    organisationId,
    ...ids,
  ]);
  return new Map(rows.map((row) => [row.id, row]));
}

interface Known {
  published: PublishedRow | undefined;
  plan: PlanRow | undefined;
  run: RunRow | undefined;
  site: SiteRow | undefined;
}

function portfolioRow(study: OwnStudy, { published, plan, run, site }: Known): PortfolioStudy {
  const milestones = inOrderOfTime(
    published ? published.milestones.map(forecastMilestone) : (plan?.milestones ?? []).map(plannedMilestone),
  );
  const next = published ? nextPlanned(milestones) : null;
  return {
    code: study.code,
    title: study.title,
    sponsorName: study.sponsor_name,
    organisationName: study.organisation_name,
    isDemonstration: study.is_demonstration,
    role: study.role,
    standing: roleMay(study.role, 'publications:read') ? standingOf(next, published !== undefined) : 'no-view',
    next,
    milestones,
    counts: published ? countsOf(published) : null,
    published: published
      ? {
          number: published.number,
          on: published.published_on,
          dataCutoff: published.data_cutoff,
          cautions: published.cautions,
        }
      : null,
    run:
      run && run.number !== published?.run_number
        ? { number: run.number, status: run.status, reason: run.failure?.reason ?? null }
        : null,
    planSavedOn: plan?.saved_on ?? null,
    site: site ? { code: site.code, name: site.name, city: site.city, monthsDue: site.due } : null,
  };
}

function forecastMilestone(forecast: MilestoneForecast): PortfolioMilestone {
  const { code, name, kind, plannedOn } = forecast;
  return { code, name: name ?? code, kind, plannedOn: plannedOn ?? null, forecast };
}

function plannedMilestone({ code, name, kind, plannedOn }: Milestone): PortfolioMilestone {
  return { code, name: name ?? code, kind, plannedOn: plannedOn ?? null, forecast: null };
}

function countsOf({ observed, milestones }: PublishedRow): NonNullable<PortfolioStudy['counts']> {
  const greatest = (kind: 'randomised' | 'events'): number | null =>
    milestones.reduce<number | null>(
      (most, one) => (one.kind === kind ? Math.max(most ?? 0, one.count ?? 0) : most),
      null,
    );
  return {
    randomised: { reached: observed.randomised, of: greatest('randomised') },
    events: observed.events === null ? null : { reached: observed.events, of: greatest('events') },
  };
}

/** On whose behalf one is here and as what: the line at the top of every signed-in page. */
export interface PersonHead {
  behalf: string | null;
  role: string;
  isOwner: boolean;
  /** A coordinator of one site has just their month; everybody else has a list of studies. */
  hasList: boolean;
}

export async function getPersonHead(scope: PersonScope, em: EntityManager): Promise<PersonHead> {
  const own = await ownStudies(scope, em);
  const owned = await em.execute<{ name: string }[]>(
    `select o.name from organisation o join organisation_member w on w.organisation_id = o.id where w.person_id = ? and w.role = 'owner' order by w.created_at limit 1`,
    [scope.actor.personId],
  );
  const roles = new Set(own.map((study) => study.role));
  const [only] = own;
  const site = own.length === 1 && only?.site_id ? await ownSite(only, scope, em) : null;
  const organisations = new Set(own.map((study) => study.organisation_name));
  const sponsors = new Set(own.map((study) => study.sponsor_name));
  const named = roles.size === 1 && roles.has('sponsor') ? sponsors : organisations;
  return {
    behalf: site ?? owned[0]?.name ?? (named.size === 1 ? [...named][0]! : null),
    role: roleWords(roles, owned.length > 0),
    isOwner: owned.length > 0,
    hasList: !(own.length === 1 && roles.has('coordinator')),
  };
}

function roleWords(roles: ReadonlySet<ActingRole>, owner: boolean): string {
  const [only] = roles;
  if (roles.size === 1 && only) return ROLE_NAMES[only];
  if (roles.size > 1) return 'several roles';
  return owner ? ROLE_NAMES.owner : 'no role yet';
}

async function ownSite(study: OwnStudy, { actor }: PersonScope, em: EntityManager): Promise<string | null> {
  await setTenancy(em, { organisationId: study.organisation_id, personId: actor.personId });
  const [site] = await em.execute<{ code: string; city: string }[]>(
    `select code, city from site where organisation_id = ? and id = ?`,
    [study.organisation_id, study.site_id],
  );
  await setTenancy(em, { personId: actor.personId });
  return site ? `Site ${site.code}, ${site.city}` : null;
}
