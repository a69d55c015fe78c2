import { createHash } from 'node:crypto';
import { type ChildProcess, spawn } from 'node:child_process';
import { once } from 'node:events';
import { setTimeout as wait } from 'node:timers/promises';
import PgBoss from 'pg-boss';
import { afterAll, afterEach, beforeAll, expect, it } from 'vitest';
import { transact } from '@/lib/db/transaction';
import { runForecast, serialiseForecast } from '@/lib/engine/forecast';
import { cancelForecast, requestForecast } from '@/lib/forecasts/commands';
import { computeForecastRun, recoverStalledRuns } from '@/lib/forecasts/jobs';
import { getRun } from '@/lib/forecasts/queries';
import type { RunStatus, RunView } from '@/lib/forecasts/schema';
import { startWorker } from '@/lib/jobs/registry';
import { parseStudyFile } from '@/lib/study-file/parse';
import { cutData, logSites, savePlan, startFileStore } from '@/tests/jobs/forecast-scene';
import type { LocalServer } from '@/tests/machine/local-servers';
import { createScene, type Scene } from '@/tests/support/scene';

/** Long enough to be caught in the middle. */
const MANY = 400_000;

let scene: Scene;
let store: LocalServer;
const started: ChildProcess[] = [];

beforeAll(async () => {
  store = await startFileStore();
  scene = await createScene();
  await savePlan(scene);
  await logSites(scene);
  await cutData(scene);
});
afterEach(() => {
  for (const child of started.splice(0)) child.kill('SIGKILL');
});
afterAll(() => store.stop());

async function request(draws: number, seed: number): Promise<number> {
  const body = { dataCutNumber: 1, cutoffOn: null, draws, seed };
  const run = await scene.act('statistician', 'forecasts:run', (scope, context) =>
    requestForecast(scope, { body }, context),
  );
  return run.number;
}

const view = (number: number): Promise<RunView> =>
  scene.act('statistician', 'forecasts:read', (scope, context) => getRun(scope, { params: { number } }, context));

async function waitFor(number: number, met: (run: RunView) => boolean, seconds = 90): Promise<RunView> {
  for (const end = Date.now() + seconds * 1000; Date.now() < end; await wait(100)) {
    const run = await view(number);
    if (met(run)) return run;
  }
  throw new Error(`run ${number} did not get there: ${JSON.stringify({ ...(await view(number)), forecast: null })}`);
}
const ended = (run: RunView): boolean => !(['queued', 'running'] as RunStatus[]).includes(run.status);
const underWay = (run: RunView): boolean => run.status === 'running' && run.drawsDone > 0;

/** A worker in a process of its own, as `npm start` has it. */
async function startProcess(): Promise<ChildProcess> {
  const child = spawn('node', ['--import', 'tsx', 'scripts/worker.ts'], {
    env: process.env,
    stdio: ['ignore', 'ignore', 'ignore', 'ipc'],
  });
  started.push(child);
  await once(child, 'message');
  return child;
}

const row = async <T extends object>(sql: string, number: number): Promise<T> =>
  (await transact({ organisationId: scene.organisationId }, (em) => em.execute<T[]>(sql, [number])))[0]!;
const filesOf = (number: number) =>
  row<{ id: string; study_file: string; forecast_file: string }>(
    'select id, study_file, forecast_file from forecast_run where number = ?',
    number,
  );
const endingsOf = (number: number) =>
  row<{ count: number }>(
    `select count(*)::int as count from audit_entry where action = 'forecasts:compute' and record_id = ?::text`,
    number,
  );

function direct(studyFile: string): string {
  const parsed = parseStudyFile(studyFile);
  if (!parsed.ok) throw new Error('the stored study file is not valid');
  const studySha256 = createHash('sha256').update(studyFile).digest('hex');
  return serialiseForecast(runForecast(parsed.study, { studySha256 }));
}

it('a worker killed in the middle: another takes the run up within seconds, and it ends once, with the same bytes', async () => {
  const number = await request(MANY, 21);
  const first = await startProcess();
  await waitFor(number, underWay);
  const gone = once(first, 'exit');
  first.kill('SIGKILL');
  await gone;
  const killed = Date.now();
  expect((await view(number)).status).toBe('running');
  await startProcess();
  const run = await waitFor(number, ended);
  expect(run).toMatchObject({ status: 'done', drawsDone: MANY });
  // Twenty seconds without a heartbeat and ten until it is looked for; the job itself would have expired in fifteen minutes.
  expect(Date.now() - killed).toBeLessThan(75_000);
  const { study_file, forecast_file } = await filesOf(number);
  expect(forecast_file).toBe(direct(study_file));
  expect((await endingsOf(number)).count).toBe(1);
}, 180_000);

it('a run cancelled in the middle stops, and the next one gets its turn', async () => {
  const worker = await startWorker({ url: process.env.DATABASE_URL! });
  const cancelled = await request(1_000_000, 31);
  await waitFor(cancelled, underWay);
  const next = await request(500, 32);
  await scene.act('statistician', 'forecasts:run', (scope, context) =>
    cancelForecast(scope, { params: { number: cancelled } }, context),
  );
  expect((await waitFor(next, ended, 15)).status).toBe('done');
  const run = await view(cancelled);
  expect(run).toMatchObject({ status: 'cancelled', forecast: null });
  expect(run.drawsDone).toBeLessThan(1_000_000);
  await worker.stop();
}, 90_000);

it('two workers at one run keep one result', async () => {
  const number = await request(20_000, 41);
  const { id: runId, study_file } = await filesOf(number);
  const payload = { organisationId: scene.organisationId, runId };
  await Promise.all([computeForecastRun(payload), computeForecastRun(payload)]);
  expect((await filesOf(number)).forecast_file).toBe(direct(study_file));
  expect((await endingsOf(number)).count).toBe(1);
}, 60_000);

it('a run that the queue has given up is ended with its reason, and a living one is left alone', async () => {
  const boss = new PgBoss({ connectionString: process.env.DATABASE_URL!, migrate: false, supervise: false });
  await boss.start();
  const number = await request(500, 51);
  const { id: runId } = await filesOf(number);
  const job = `name = 'forecast-run' and data->>'runId' = '${runId}'`;
  const set = (sql: string) => transact({ organisationId: scene.organisationId }, (em) => em.execute(sql));
  const heart = (age: string) =>
    set(`update forecast_run set status = 'running', heartbeat_at = now() - interval '${age}' where id = '${runId}'`);

  await set(`update pgboss.job set state = 'active', started_on = now() - interval '5 minutes' where ${job}`);
  await heart('2 seconds');
  await recoverStalledRuns(boss);
  expect(await row<{ state: string }>(`select state from pgboss.job where ${job} and ? > 0`, 1)).toEqual({
    state: 'active',
  });

  await heart('1 minute');
  await recoverStalledRuns(boss);
  expect(await row<{ state: string }>(`select state from pgboss.job where ${job} and ? > 0`, 1)).toEqual({
    state: 'retry',
  });

  await set(`update pgboss.job set state = 'failed', completed_on = now() where ${job}`);
  await recoverStalledRuns(boss);
  const run = await view(number);
  expect(run.status).toBe('failed');
  expect(run.failure!.reason).toMatch(/broken off again and again/);
  await boss.stop({ graceful: false });
});
