import { createHash, randomUUID } from 'node:crypto';
import type { EntityManager } from '@mikro-orm/postgresql';
import type { DataCutRow } from '../../entities/data-cut';
import { PlanVersion, type PlanVersionRow } from '../../entities/plan-version';
import { Study } from '../../entities/study';
import { type CommandContext, recordAudit } from '../audit/record';
import type { StudyScope } from '../auth/scope';
import { calendarDay } from '../clock';
import { getCutRow, listCutSubjects } from '../data-cuts/queries';
import { lastEndedMonth, monthEnd } from '../dates';
import { ConflictError, InvalidError, NotFoundError, TooManyError } from '../errors';
import { formatDate } from '../format';
import { enqueue } from '../jobs/enqueue';
import { loggedEnrolment } from '../site-log/queries';
import { parseStudyFile } from '../study-file/parse';
import { getRunRecord } from './queries';
import { buildStudyFile, type CutData, serialiseStudyFile } from './rules';
import { MOST_RUNS_AT_ONCE, type RequestForecastBody, type Run } from './schema';
import { serialiseRun } from './serialise';

type RunScope = StudyScope<'forecasts:run'>;

/**
 * Puts a run on the queue with the exact study file that it will read. A file that the engine can't take is refused here,
 * with every fault; the button pressed twice gives the run that is under way.
 */
export async function requestForecast(
  scope: RunScope,
  { body }: { body: RequestForecastBody },
  context: CommandContext,
): Promise<Run> {
  const { em, clock } = context;
  const { organisationId, studyId } = scope;
  const plan = await em.findOne(PlanVersion, { organisationId, studyId }, { orderBy: { number: 'desc' } });
  if (!plan)
    throw new InvalidError([
      { pointer: '', detail: 'The study has no plan yet. Save the plan as a version, then run a forecast.' },
    ]);
  const cut = await findCut(scope, body, em);
  const cutoffOn = body.cutoffOn ?? cut?.cutoffOn ?? monthEnd(lastEndedMonth(calendarDay(clock.now())));
  refuseCutoff(cutoffOn, cut, calendarDay(clock.now()));
  const studyFile = await writeStudyFile(scope, { plan, cut, cutoffOn, body }, em);
  const studySha256 = createHash('sha256').update(studyFile).digest('hex');
  await holdOrganisation(scope, em);
  const [present] = await em.execute<{ number: number }[]>(
    `select number from forecast_run where organisation_id = ? and study_id = ? and study_sha256 = ? and status in ('queued', 'running') limit 1`,
    [organisationId, studyId, studySha256],
  );
  if (present) return serialiseRun(await getRunRecord(scope, present.number, em));
  await refuseTooMany(scope, em);
  const number = await insertRun(scope, context, { plan, cut, cutoffOn, studyFile, studySha256 });
  return serialiseRun(await getRunRecord(scope, number, em));
}

async function findCut(scope: RunScope, body: RequestForecastBody, em: EntityManager): Promise<DataCutRow | null> {
  if (body.dataCutNumber === null) return null;
  try {
    return await getCutRow(scope, body.dataCutNumber, em);
  } catch (error) {
    if (error instanceof NotFoundError)
      throw new InvalidError([{ pointer: '/dataCutNumber', detail: `${error.message} Choose one that there is.` }]);
    throw error;
  }
}

function refuseCutoff(cutoffOn: string, cut: DataCutRow | null, today: string): void {
  const refuse = (detail: string): never => {
    throw new InvalidError([{ pointer: '/cutoffOn', detail }]);
  };
  if (cutoffOn > today) refuse(`${formatDate(cutoffOn)} lies ahead. Give today or an earlier day.`);
  if (cut && cut.cutoffOn !== cutoffOn)
    refuse(`Data cut ${cut.number} is to ${formatDate(cut.cutoffOn)}. Give that day, or choose another cut.`);
}

interface ToWrite {
  plan: PlanVersionRow;
  cut: DataCutRow | null;
  cutoffOn: string;
  body: RequestForecastBody;
}

async function writeStudyFile(
  scope: RunScope,
  { plan, cut, cutoffOn, body }: ToWrite,
  em: EntityManager,
): Promise<string> {
  const study = await em.findOneOrFail(Study, { organisationId: scope.organisationId, id: scope.studyId });
  const text = serialiseStudyFile(
    buildStudyFile({
      study: { code: study.code, title: study.title },
      plan: plan.plan,
      sites: await loggedEnrolment(em, scope, cutoffOn),
      cut: cut && (await dataOf(scope, cut, em)),
      cutoffOn,
      draws: body.draws,
      seed: body.seed,
    }),
  );
  const parsed = parseStudyFile(text);
  if (!parsed.ok) throw new InvalidError(parsed.errors);
  return text;
}

async function dataOf(scope: RunScope, cut: DataCutRow, em: EntityManager): Promise<CutData> {
  if (cut.kind === 'aggregate') return { kind: 'aggregate', aggregate: cut.aggregate! };
  return { kind: 'subjects', subjects: await listCutSubjects(scope, cut.id, em) };
}

/** Requests of one organisation one after another: numbers, the limit and the second press of a button depend on it. */
async function holdOrganisation({ organisationId }: RunScope, em: EntityManager): Promise<void> {
  await em.execute(`select 1 from organisation where id = ? for no key update`, [organisationId]);
}

async function refuseTooMany({ organisationId }: RunScope, em: EntityManager): Promise<void> {
  const [row] = await em.execute<{ count: number }[]>(
    `select count(*)::int as count from forecast_run where organisation_id = ? and status in ('queued', 'running')`,
    [organisationId],
  );
  if ((row?.count ?? 0) >= MOST_RUNS_AT_ONCE)
    throw new TooManyError(
      `${MOST_RUNS_AT_ONCE} runs of your organisation are under way. Wait until one is done, or cancel one.`,
      30,
    );
}

interface NewRun extends Omit<ToWrite, 'body'> {
  studyFile: string;
  studySha256: string;
}

async function insertRun(
  scope: RunScope,
  context: CommandContext,
  { plan, cut, cutoffOn, studyFile, studySha256 }: NewRun,
): Promise<number> {
  const { em, clock } = context;
  const { organisationId, studyId, actor } = scope;
  const { draws, seed } = (JSON.parse(studyFile) as { simulation: { draws: number; seed: number } }).simulation;
  const id = randomUUID();
  const [{ number }] = await em.execute<[{ number: number }]>(
    `insert into forecast_run (id, organisation_id, study_id, number, status, cutoff_on, plan_version_id, data_cut_id, draws, seed, study_file, study_sha256, requested_at, requested_by)
     select ?, ?, ?, coalesce(max(number), 0) + 1, 'queued', ?, ?, ?, ?, ?, ?, ?, ?, ? from forecast_run where organisation_id = ? and study_id = ? returning number`,
    [
      id,
      organisationId,
      studyId,
      cutoffOn,
      plan.id,
      cut?.id ?? null,
      draws,
      seed,
      studyFile,
      studySha256,
      clock.now(),
      actor.personId,
      organisationId,
      studyId,
    ],
  );
  await recordAudit(context, scope, {
    action: 'forecasts:request',
    recordType: 'forecast-run',
    recordId: String(number),
    changes: Object.entries({
      cutoffOn,
      planVersion: plan.number,
      dataCut: cut?.number ?? null,
      draws,
      seed,
      studySha256,
    }).map(([field, value]) => ({ field, old: null, new: value })),
  });
  await enqueue(em, 'forecast-run', { organisationId, runId: id });
  return number;
}

/** Its worker learns of it within a second and stops. A run that has ended stays as it ended. */
export async function cancelForecast(
  scope: RunScope,
  { params }: { params: { number: number } },
  context: CommandContext,
): Promise<Run> {
  const { em, clock } = context;
  const before = await getRunRecord(scope, params.number, em);
  const rows = await em.execute<{ status: string }[]>(
    `update forecast_run r set status = 'cancelled', finished_at = ?, version = r.version + 1
       from forecast_run o where r.organisation_id = ? and r.id = ? and o.organisation_id = r.organisation_id and o.id = r.id and r.status in ('queued', 'running') returning o.status`,
    [clock.now(), scope.organisationId, before.id],
  );
  const run = serialiseRun(await getRunRecord(scope, params.number, em));
  if (rows.length > 0) {
    await recordAudit(context, scope, {
      action: 'forecasts:cancel',
      recordType: 'forecast-run',
      recordId: String(run.number),
      changes: [{ field: 'status', old: rows[0]!.status, new: 'cancelled' }],
    });
  } else if (run.status !== 'cancelled') {
    throw new ConflictError(`Run ${run.number} has ended already; there is nothing to cancel.`, run);
  }
  return run;
}
