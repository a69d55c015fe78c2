import { createHash } from 'node:crypto';
import type { EntityManager } from '@mikro-orm/postgresql';
import type PgBoss from 'pg-boss';
import { recordAudit } from '../audit/record';
import { type Clock, systemClock } from '../clock';
import { transact } from '../db/transaction';
import { serialiseForecast } from '../engine/serialise';
import type { Forecast } from '../engine/types';
import type { JobPayload } from '../jobs/queues';
import { createWorkerPool, type WorkerPool } from '../jobs/worker-pool';
import { log } from '../log';
import { parseStudyFile } from '../study-file/parse';
import type { RunFailure } from './schema';

type Payload = JobPayload<'forecast-run'>;

const BEAT_MILLISECONDS = 1000;
/** A run whose worker has not said for so long that it lives is taken up again. */
const STALE_AFTER_SECONDS = 20;

let pool: Promise<WorkerPool> | undefined;

/** A run as this worker has claimed it. Whoever claims it later has a higher version, and this one's results are void. */
interface Claim extends Payload {
  version: number;
  number: number;
  studyId: string;
  studyFile: string;
  studySha256: string;
}

/**
 * Computes a queued run. The queue may hand it out more than once: a run that has ended is left alone, one that another
 * worker has dropped is computed anew, and of two workers at the same run only the later one's result is kept. The bytes are
 * the same whichever it is.
 */
export async function computeForecastRun(payload: Payload, clock: Clock = systemClock): Promise<void> {
  const claim = await claimRun(payload, clock);
  if (!claim) return;
  const lost = new AbortController();
  let drawsDone = 0;
  const heart = startHeart(claim, () => drawsDone, lost);
  try {
    const forecast = await runEngine(claim, { signal: lost.signal, onProgress: (draws) => (drawsDone = draws) });
    await storeForecast(claim, forecast, clock);
  } catch (error) {
    if (lost.signal.aborted) return;
    if (!(error instanceof EngineFault)) throw error;
    await storeFailure(claim, error.failure, clock);
  } finally {
    heart.stop();
  }
}

async function claimRun({ organisationId, runId }: Payload, clock: Clock): Promise<Claim | null> {
  return transact({ organisationId }, async (em) => {
    const [row] = await em.execute<
      { version: number; number: number; study_id: string; study_file: string; study_sha256: string }[]
    >(
      `update forecast_run set status = 'running', started_at = ?, heartbeat_at = clock_timestamp(), draws_done = 0, version = version + 1
        where organisation_id = ? and id = ? and status in ('queued', 'running') returning version, number, study_id, study_file, study_sha256`,
      [clock.now(), organisationId, runId],
    );
    if (!row) return null;
    const { version, number, study_id: studyId, study_file: studyFile, study_sha256: studySha256 } = row;
    return { organisationId, runId, version, number, studyId, studyFile, studySha256 };
  });
}

/** Says once a second that the worker lives and how far it is; hears that the run is cancelled or another's now. */
function startHeart(claim: Claim, drawsDone: () => number, lost: AbortController): { stop: () => void } {
  const beat = async (): Promise<void> => {
    const rows = await transact({ organisationId: claim.organisationId }, (em) =>
      em.execute(
        `update forecast_run set heartbeat_at = clock_timestamp(), draws_done = ?
          where organisation_id = ? and id = ? and status = 'running' and version = ? returning 1`,
        [drawsDone(), claim.organisationId, claim.runId, claim.version],
      ),
    );
    if (rows.length === 0) lost.abort();
  };
  let beating = false;
  const timer = setInterval(() => {
    if (beating) return;
    beating = true;
    beat()
      .catch((error: unknown) => log.warn({ err: error, run: claim.runId }, 'no heartbeat'))
      .finally(() => {
        beating = false;
      });
  }, BEAT_MILLISECONDS);
  return { stop: () => clearInterval(timer) };
}

/** What the computation itself came to grief over, told from a database or a queue that is away for a moment. */
class EngineFault extends Error {
  constructor(readonly failure: RunFailure) {
    super(failure.reason);
  }
}

async function runEngine(
  { studyFile, studySha256, runId }: Claim,
  options: { signal: AbortSignal; onProgress: (drawsDone: number) => void },
): Promise<Forecast> {
  const parsed = parseStudyFile(studyFile);
  if (!parsed.ok)
    throw new EngineFault({ reason: 'The study file is not one that this version computes.', errors: parsed.errors });
  try {
    pool ??= createWorkerPool();
    return await (await pool).run(parsed.study, { studySha256, ...options });
  } catch (error) {
    if (options.signal.aborted) throw error;
    log.error({ err: error, run: runId }, 'forecast run failed');
    // The engine's own sentences (a prior that is not proper, a horizon too short) are for people; other faults are not.
    const reason =
      error instanceof RangeError
        ? error.message
        : 'The computation stopped on a fault of the program. Quote this run.';
    throw new EngineFault({ reason, errors: [] });
  }
}

/** The result counts only while the run is still this worker's. */
async function endRun(
  em: EntityManager,
  { organisationId, runId, version }: Claim,
  columns: Record<string, unknown>,
): Promise<boolean> {
  const names = Object.keys(columns);
  const rows = await em.execute(
    `update forecast_run set ${names.map((name) => `${name} = ?`).join(', ')}, heartbeat_at = clock_timestamp(), version = version + 1
      where organisation_id = ? and id = ? and status = 'running' and version = ? returning 1`,
    [...Object.values(columns), organisationId, runId, version],
  );
  return rows.length > 0;
}

async function storeForecast(claim: Claim, forecast: Forecast, clock: Clock): Promise<void> {
  const text = serialiseForecast(forecast);
  await transact({ organisationId: claim.organisationId }, async (em) => {
    const kept = await endRun(em, claim, {
      status: 'done',
      forecast_file: text,
      forecast: text,
      engine_version: forecast.engineVersion,
      draws_done: forecast.draws,
      finished_at: clock.now(),
    });
    if (!kept) return;
    await tellTrail(em, claim, clock, {
      status: 'done',
      forecastSha256: createHash('sha256').update(text).digest('hex'),
      engineVersion: forecast.engineVersion,
    });
  });
}

async function storeFailure(claim: Claim, failure: RunFailure, clock: Clock): Promise<void> {
  await transact({ organisationId: claim.organisationId }, async (em) => {
    const columns = { status: 'failed', failure: JSON.stringify(failure), finished_at: clock.now() };
    if (await endRun(em, claim, columns))
      await tellTrail(em, claim, clock, { status: 'failed', reason: failure.reason });
  });
}

async function tellTrail(
  em: EntityManager,
  { organisationId, studyId, number }: Pick<Claim, 'organisationId' | 'studyId' | 'number'>,
  clock: Clock,
  outcome: Record<string, unknown>,
): Promise<void> {
  await recordAudit(
    { em, clock, requestId: null, source: 'job' },
    { actor: null, role: 'worker', organisationId, studyId },
    {
      action: 'forecasts:compute',
      recordType: 'forecast-run',
      recordId: String(number),
      changes: Object.entries(outcome).map(([field, value]) => ({ field, old: null, new: value })),
    },
  );
}

/**
 * Gives runs back to the queue whose worker died with them, so that they are taken up within seconds and not when the job
 * expires; and ends those that the queue has given up. A worker asks at its start and every ten seconds.
 */
export async function recoverStalledRuns(
  boss: Pick<PgBoss, 'fail'>,
  staleAfterSeconds = STALE_AFTER_SECONDS,
): Promise<void> {
  const jobs = await transact({}, (em) =>
    em.execute<{ id: string; state: 'active' | 'failed'; data: Payload }[]>(
      `select id, state, data from pgboss.job where name = 'forecast-run'
          and (state = 'active' and started_on < now() - make_interval(secs => ?) or state = 'failed' and completed_on > now() - interval '1 day') limit 100`,
      [staleAfterSeconds],
    ),
  );
  for (const { id, state, data } of jobs) {
    const stalled = await transact({ organisationId: data.organisationId }, async (em) => {
      const [run] = await em.execute<{ open: boolean; stale: boolean; number: number; study_id: string }[]>(
        `select status in ('queued', 'running') as open, number, study_id,
                coalesce(heartbeat_at < clock_timestamp() - make_interval(secs => ?), true) as stale
           from forecast_run where organisation_id = ? and id = ? for update`,
        [staleAfterSeconds, data.organisationId, data.runId],
      );
      if (run?.open && run.stale && state === 'failed') await giveUp(em, data, run);
      return run?.stale === true && state === 'active';
    });
    if (!stalled) continue;
    log.warn({ job: id, run: data.runId }, 'worker gone; the run goes back to the queue');
    await boss.fail('forecast-run', id, { message: 'no heartbeat' });
  }
}

async function giveUp(
  em: EntityManager,
  { organisationId, runId }: Payload,
  { number, study_id: studyId }: { number: number; study_id: string },
): Promise<void> {
  const failure: RunFailure = {
    reason: 'The computation was broken off again and again. Run it anew with fewer draws, or ask for help.',
    errors: [],
  };
  await em.execute(
    `update forecast_run set status = 'failed', failure = ?::jsonb, finished_at = ?, version = version + 1 where organisation_id = ? and id = ?`,
    [JSON.stringify(failure), systemClock.now(), organisationId, runId],
  );
  await tellTrail(em, { organisationId, studyId, number }, systemClock, { status: 'failed', reason: failure.reason });
}
