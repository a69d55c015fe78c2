import type { EntityManager } from '@mikro-orm/postgresql';
import { DataCut } from '../../entities/data-cut';
import { ForecastRun } from '../../entities/forecast-run';
import { PlanVersion } from '../../entities/plan-version';
import { Publication } from '../../entities/publication';
import type { CommandContext } from '../audit/record';
import type { StudyAction } from '../auth/permissions';
import type { StudyScope } from '../auth/scope';
import { calendarDay } from '../clock';
import { lastEndedMonth, monthEnd } from '../dates';
import type { Forecast, Study } from '../engine/types';
import { NotFoundError } from '../errors';
import { medianMoved, publishedForecast } from '../publications/rules';
import { loggedEnrolment, studyTotalsByMonth } from '../site-log/queries';
import { countReporting, eventSourceOf } from './rules';
import type { Run, RunChoices, RunContext, RunView } from './schema';
import { type RunRecord, serialisePlanned, serialiseRun } from './serialise';

type Read = Pick<CommandContext, 'em'>;
type RunScope = StudyScope<'forecasts:read'> | StudyScope<'forecasts:run'>;

const keyOf = (scope: StudyScope<StudyAction>) => ({ organisationId: scope.organisationId, studyId: scope.studyId });

const RUNS_SQL = `
  select r.id, r.number, r.status, to_char(r.cutoff_on, 'YYYY-MM-DD') as cutoff_on, v.number as plan_version, c.number as data_cut, r.draws, r.draws_done, r.seed,
         r.study_sha256, r.engine_version, r.failure, r.requested_at, p.name as requested_by, r.started_at, r.finished_at, b.number as publication,
         (r.forecast->'milestones'->0) - 'density' as first_milestone
    from forecast_run r
    join plan_version v on v.organisation_id = r.organisation_id and v.id = r.plan_version_id
    join person p on p.id = r.requested_by
    left join data_cut c on c.organisation_id = r.organisation_id and c.id = r.data_cut_id
    left join publication b on b.organisation_id = r.organisation_id and b.run_id = r.id
   where r.organisation_id = ? and r.study_id = ?`;

export async function listRuns(
  scope: StudyScope<'forecasts:read'>,
  { query }: { query: { page: number; size: number } },
  { em }: Read,
): Promise<{ items: Run[]; page: number; size: number; total: number }> {
  const rows = await em.execute<RunRecord[]>(`${RUNS_SQL} order by r.number desc limit ? offset ?`, [
    scope.organisationId,
    scope.studyId,
    query.size,
    (query.page - 1) * query.size,
  ]);
  const total = await em.count(ForecastRun, keyOf(scope));
  return { items: rows.map(serialiseRun), page: query.page, size: query.size, total };
}

export async function getRunRecord(scope: RunScope, number: number, em: EntityManager): Promise<RunRecord> {
  const [row] = await em.execute<RunRecord[]>(`${RUNS_SQL} and r.number = ?`, [
    scope.organisationId,
    scope.studyId,
    number,
  ]);
  if (!row) throw new NotFoundError(`There is no run ${number} of ${scope.studyCode}.`);
  return row;
}

export async function getRun(
  scope: StudyScope<'forecasts:read'>,
  { params }: { params: { number: number } },
  { em }: Read,
): Promise<RunView> {
  const run = serialiseRun(await getRunRecord(scope, params.number, em));
  if (run.status !== 'done') return { ...run, forecast: null, context: null };
  const row = await em.findOneOrFail(
    ForecastRun,
    { ...keyOf(scope), number: run.number },
    { populate: ['studyFile', 'forecast'] },
  );
  const forecast = row.forecast!.unwrap()!;
  const study = JSON.parse(row.studyFile.unwrap()!) as Study;
  return { ...run, forecast, context: await contextOf(scope, run, { forecast, study }, em) };
}

/** Number of the newest run, and of the newest one with a forecast. */
export async function findLatestRuns(
  scope: StudyScope<'forecasts:read'>,
  em: EntityManager,
): Promise<{ latest: number | null; done: number | null }> {
  const [row] = await em.execute<{ latest: number | null; done: number | null }[]>(
    `select max(number) as latest, max(number) filter (where status = 'done') as done from forecast_run where organisation_id = ? and study_id = ?`,
    [scope.organisationId, scope.studyId],
  );
  return row ?? { latest: null, done: null };
}

async function contextOf(
  scope: StudyScope<'forecasts:read'>,
  run: Run,
  { forecast, study }: { forecast: Forecast; study: Study },
  em: EntityManager,
): Promise<RunContext> {
  const names = { code: study.study.code, title: study.study.title, sponsorName: '' };
  const totals = await studyTotalsByMonth(em, scope, run.cutoffOn);
  const { observedMonthly } = publishedForecast(names, { number: run.number, forecast, studyFile: study }, totals);
  return {
    observed: observedMonthly.map(({ monthEnd: on, randomised, events }) => ({ on, randomised, events })),
    eventSource: eventSourceOf(study),
    sites: countReporting(study),
    plan: serialisePlanned(study),
    before: await runBefore(scope, run.number, em),
    moved: await movedSincePublication(scope, run, forecast, em),
  };
}

async function runBefore(
  scope: StudyScope<'forecasts:read'>,
  number: number,
  em: EntityManager,
): Promise<RunContext['before']> {
  const [row] = await em.execute<{ number: number; cutoff_on: string; observed: Forecast['observed'] }[]>(
    `select number, to_char(cutoff_on, 'YYYY-MM-DD') as cutoff_on, forecast->'observed' as observed from forecast_run
      where organisation_id = ? and study_id = ? and status = 'done' and number < ? order by number desc limit 1`,
    [scope.organisationId, scope.studyId, number],
  );
  return row ? { number: row.number, cutoffOn: row.cutoff_on, observed: row.observed } : null;
}

/** Against the publication before its own, or the last one where the run is not published. */
async function movedSincePublication(
  scope: StudyScope<'forecasts:read'>,
  { publication }: Run,
  { milestones }: Forecast,
  em: EntityManager,
): Promise<RunContext['moved']> {
  const row = await em.findOne(
    Publication,
    { ...keyOf(scope), ...(publication !== null && { number: { $lt: publication } }) },
    { orderBy: { number: 'desc' } },
  );
  if (!row) return null;
  const before = new Map(row.content.milestones.map((milestone) => [milestone.code, milestone]));
  return {
    publication: row.number,
    publishedOn: calendarDay(row.publishedAt),
    days: Object.fromEntries(milestones.map((one) => [one.code, medianMoved(before.get(one.code), one)])),
  };
}

export async function getStudyFile(
  scope: StudyScope<'forecasts:read'>,
  { params }: { params: { number: number } },
  { em }: Read,
): Promise<Response> {
  const row = await getFilesRow(scope, params.number, em);
  return download(row.study_file, `${scope.studyCode}-run-${params.number}-study.json`);
}

export async function getForecastFile(
  scope: StudyScope<'forecasts:read'>,
  { params }: { params: { number: number } },
  { em }: Read,
): Promise<Response> {
  const row = await getFilesRow(scope, params.number, em);
  if (row.forecast_file === null) throw new NotFoundError(`Run ${params.number} has no forecast.`);
  return download(row.forecast_file, `${scope.studyCode}-run-${params.number}-forecast.json`);
}

async function getFilesRow(
  scope: StudyScope<'forecasts:read'>,
  number: number,
  em: EntityManager,
): Promise<{ study_file: string; forecast_file: string | null }> {
  const [row] = await em.execute<{ study_file: string; forecast_file: string | null }[]>(
    `select study_file, forecast_file from forecast_run where organisation_id = ? and study_id = ? and number = ?`,
    [scope.organisationId, scope.studyId, number],
  );
  if (!row) throw new NotFoundError(`There is no run ${number} of ${scope.studyCode}.`);
  return row;
}

function download(text: string, fileName: string): Response {
  return new Response(text, {
    headers: {
      'content-type': 'application/json',
      'content-disposition': `attachment; filename="${fileName}"`,
      'cache-control': 'no-store',
    },
  });
}

/** As many cuts as the form offers. */
const MOST_CUTS = 50;

export async function listRunChoices(
  scope: StudyScope<'forecasts:run'>,
  { em, clock }: Pick<CommandContext, 'em' | 'clock'>,
): Promise<RunChoices> {
  const today = calendarDay(clock.now());
  const lastMonthEnd = monthEnd(lastEndedMonth(today));
  const version = await em.findOne(PlanVersion, keyOf(scope), { orderBy: { number: 'desc' } });
  const cuts = await em.find(DataCut, keyOf(scope), { orderBy: { number: 'desc' }, limit: MOST_CUTS });
  const sites = await loggedEnrolment(em, scope, lastMonthEnd);
  return {
    plan: version && {
      number: version.number,
      draws: version.plan.simulation.draws,
      seed: version.plan.simulation.seed,
      hasEvents: version.plan.events !== null,
    },
    cuts: cuts.map(({ number, cutoffOn, kind, counts }) => ({ number, cutoffOn, kind, subjects: counts.subjects })),
    lastMonthEnd,
    today,
    logged: sites.reduce((sum, site) => sum + site.randomised, 0),
    open: sites.filter((site) => site.activatedOn !== null).length,
  };
}
