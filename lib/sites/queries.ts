import type { EntityManager } from '@mikro-orm/postgresql';
import type { CommandContext } from '../audit/record';
import type { StudyScope } from '../auth/scope';
import { calendarDay } from '../clock';
import { countryName } from '../countries';
import { NotFoundError } from '../errors';
import { loggableMonths } from '../site-log/rules';
import { Site } from '../../entities/site';
import { NOTHING_LOGGED, siteStatus, type SiteRecord } from './rules';
import type { SitesPage, SitesQuery, SitesSummary, SiteStatus, SiteView, SiteWindows } from './schema';
import { serialiseSite } from './serialise';

type Read = Pick<CommandContext, 'em' | 'clock'>;
type SitesScope = StudyScope<'sites:read'> | StudyScope<'sites:change'>;

/** The status as `siteStatus` has it; `?` is today, twice. */
const STATUS_SQL = `case when s.closed_on < ?::date then 'closed' when s.activated_on is not null then 'open' when s.planned_latest < ?::date then 'overdue' else 'to-open' end`;

interface ListedRecord {
  id: string;
  code: string;
  name: string;
  city: string;
  country: string;
  planned_earliest: string | null;
  planned_likely: string | null;
  planned_latest: string | null;
  activated_on: string | null;
  closed_on: string | null;
  cap: number | null;
  version: number;
  randomised: number;
  reported: number;
  partial: number;
  total: number;
}

const LISTED_SQL = `
  select s.id, s.code, s.name, s.city, s.country, to_char(s.planned_earliest, 'YYYY-MM-DD') as planned_earliest, to_char(s.planned_likely, 'YYYY-MM-DD') as planned_likely,
         to_char(s.planned_latest, 'YYYY-MM-DD') as planned_latest, to_char(s.activated_on, 'YYYY-MM-DD') as activated_on, to_char(s.closed_on, 'YYYY-MM-DD') as closed_on, s.cap, s.version,
         coalesce(l.randomised, 0)::int as randomised, coalesce(l.reported, 0)::int as reported, coalesce(l.partial, 0)::int as partial, count(*) over ()::int as total
    from site s
    left join (
      select site_id, sum(randomised) as randomised, count(*) filter (where num_nulls(screened, failed, randomised, events, withdrawn) = 0) as reported,
             count(*) filter (where num_nulls(screened, failed, randomised, events, withdrawn) between 1 and 4) as partial
        from site_month where organisation_id = ? and study_id = ? group by site_id) l on l.site_id = s.id`;

/** By code: sites are never ranked by their counts. */
export async function listSites(
  scope: StudyScope<'sites:read'>,
  { query }: { query: SitesQuery },
  { em, clock }: Read,
): Promise<SitesPage> {
  const today = calendarDay(clock.now());
  const where = ['s.organisation_id = ?', 's.study_id = ?'];
  const values: unknown[] = [scope.organisationId, scope.studyId, scope.organisationId, scope.studyId];
  if (query.search) {
    const word = query.search.toLowerCase();
    const countries = await countriesNamedLike(scope, em, word);
    where.push(
      `(position(? in lower(s.code || ' ' || s.name || ' ' || s.city)) > 0${countries.length > 0 ? ` or s.country in (${countries.map(() => '?').join(', ')})` : ''})`,
    );
    values.push(word, ...countries);
  }
  if (query.country) {
    where.push('s.country = ?');
    values.push(query.country);
  }
  if (query.status) {
    where.push(`${STATUS_SQL} = ?`);
    values.push(today, today, query.status);
  }
  const rows = await em.execute<ListedRecord[]>(
    `${LISTED_SQL} where ${where.join(' and ')} order by s.code limit ? offset ?`,
    [...values, query.size, (query.page - 1) * query.size],
  );
  return {
    items: rows.map((row) => listedSite(row, today)),
    page: query.page,
    size: query.size,
    total: rows[0]?.total ?? 0,
  };
}

function listedSite(row: ListedRecord, today: string): SitesPage['items'][number] {
  const dates = {
    plannedEarliest: row.planned_earliest,
    plannedLikely: row.planned_likely,
    plannedLatest: row.planned_latest,
    activatedOn: row.activated_on,
    closedOn: row.closed_on,
  };
  const { id, code, name, city, country, cap, version, randomised } = row;
  const expected = loggableMonths({ ...dates, cap }, today).length;
  return {
    ...{ id, code, name, city, country, ...dates, cap, version, randomised },
    status: siteStatus(dates, today),
    monthsMissing: Math.max(0, expected - row.reported - row.partial),
    monthsIncomplete: row.partial,
  };
}

/** People look for "Poland", the table has PL. */
async function countriesNamedLike(scope: SitesScope, em: EntityManager, word: string): Promise<string[]> {
  const codes = await countriesOf(scope, em);
  return codes.filter((code) => countryName(code).toLowerCase().includes(word));
}

async function countriesOf(scope: SitesScope, em: EntityManager): Promise<string[]> {
  const rows = await em.execute<{ country: string }[]>(
    `select distinct country from site where organisation_id = ? and study_id = ?`,
    [scope.organisationId, scope.studyId],
  );
  return rows.map((row) => row.country).sort((a, b) => countryName(a).localeCompare(countryName(b), 'en-GB'));
}

export async function getSite(
  scope: StudyScope<'sites:read'>,
  { params }: { params: { site: string } },
  { em }: Pick<CommandContext, 'em'>,
): Promise<SiteView> {
  const site = await em.findOne(Site, {
    organisationId: scope.organisationId,
    studyId: scope.studyId,
    code: params.site,
  });
  if (!site) throw new NotFoundError(`There is no site ${params.site} in this study.`);
  return serialiseSite(site);
}

export async function summariseSites(scope: StudyScope<'sites:read'>, { em, clock }: Read): Promise<SitesSummary> {
  const today = calendarDay(clock.now());
  const rows = await em.execute<{ status: SiteStatus; sites: number }[]>(
    `select ${STATUS_SQL} as status, count(*)::int as sites from site s where s.organisation_id = ? and s.study_id = ? group by 1`,
    [today, today, scope.organisationId, scope.studyId],
  );
  const [logged] = await em.execute<{ randomised: number }[]>(
    `select coalesce(sum(randomised), 0)::int as randomised from site_month where organisation_id = ? and study_id = ?`,
    [scope.organisationId, scope.studyId],
  );
  const byStatus = { open: 0, 'to-open': 0, overdue: 0, closed: 0 };
  for (const row of rows) byStatus[row.status] = row.sites;
  const total = rows.reduce((sum, row) => sum + row.sites, 0);
  return { today, total, byStatus, countries: await countriesOf(scope, em), randomised: logged!.randomised };
}

/** As many windows as are drawn under each other. */
const MOST_WINDOWS = 40;

export async function listWindows(scope: StudyScope<'sites:read'>, { em, clock }: Read): Promise<SiteWindows> {
  const today = calendarDay(clock.now());
  const rows = await em.execute<
    { code: string; name: string; city: string; earliest: string; likely: string; latest: string; total: number }[]
  >(
    `select code, name, city, to_char(planned_earliest, 'YYYY-MM-DD') as earliest, to_char(planned_likely, 'YYYY-MM-DD') as likely, to_char(planned_latest, 'YYYY-MM-DD') as latest, count(*) over ()::int as total
       from site where organisation_id = ? and study_id = ? and activated_on is null and planned_likely is not null
      order by planned_latest >= ?::date, planned_likely, code limit ${MOST_WINDOWS}`,
    [scope.organisationId, scope.studyId, today],
  );
  const items = rows.map(({ total: _total, ...row }) => ({ ...row, overdue: row.latest < today }));
  return { today, items, total: rows[0]?.total ?? 0 };
}

/** What is logged for a site, for the rules about changing it. */
export async function recordOfSite(scope: SitesScope, em: EntityManager, siteId: string): Promise<SiteRecord> {
  const [row] = await em.execute<{ randomised: number; first: string | null; last: string | null }[]>(
    `select coalesce(sum(randomised), 0)::int as randomised, to_char(min(month), 'YYYY-MM') as first,
            to_char(max(month) filter (where screened > 0 or randomised > 0), 'YYYY-MM') as last
       from site_month where organisation_id = ? and study_id = ? and site_id = ?`,
    [scope.organisationId, scope.studyId, siteId],
  );
  return row ? { randomised: row.randomised, firstMonth: row.first, lastPatientMonth: row.last } : NOTHING_LOGGED;
}
