import { createHash, randomUUID } from 'node:crypto';
import { spawnSync } from 'node:child_process';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { POST as cancelRoute } from '@/app/api/v1/studies/[code]/forecasts/[number]/cancel/route';
import { GET as forecastFileRoute } from '@/app/api/v1/studies/[code]/forecasts/[number]/forecast-file/route';
import { GET as getRoute } from '@/app/api/v1/studies/[code]/forecasts/[number]/route';
import { GET as studyFileRoute } from '@/app/api/v1/studies/[code]/forecasts/[number]/study-file/route';
import { GET as listRoute, POST as requestRoute } from '@/app/api/v1/studies/[code]/forecasts/route';
import { transact } from '@/lib/db/transaction';
import { runForecast, serialiseForecast } from '@/lib/engine/forecast';
import { computeForecastRun } from '@/lib/forecasts/jobs';
import {
  cancelForecastOperation,
  getForecastFileOperation,
  getRunOperation,
  getStudyFileOperation,
  listRunsOperation,
  requestForecastOperation,
} from '@/lib/forecasts/operations';
import { parseStudyFile } from '@/lib/study-file/parse';
import { CUTOFF, cutData, logSites, plan, savePlan, startFileStore } from '@/tests/jobs/forecast-scene';
import type { LocalServer } from '@/tests/machine/local-servers';
import { createScene, type PersonaName, type Scene } from '@/tests/support/scene';

let scene: Scene;
let store: LocalServer;
beforeAll(async () => {
  store = await startFileStore();
  scene = await createScene();
});
afterAll(() => store.stop());

const request = (as: PersonaName, body: object = {}) =>
  scene.call(requestRoute, requestForecastOperation, { as, body });
const list = (as: PersonaName, query: Record<string, unknown> = {}) =>
  scene.call(listRoute, listRunsOperation, { as, query });
const of = (number: number) => ({ params: { number } });
const get = (as: PersonaName, number: number) => scene.call(getRoute, getRunOperation, { as, ...of(number) });
const cancel = (as: PersonaName, number: number) =>
  scene.call(cancelRoute, cancelForecastOperation, { as, ...of(number) });
const studyFile = (as: PersonaName, number: number) =>
  scene.call(studyFileRoute, getStudyFileOperation, { as, ...of(number) });
const forecastFile = (as: PersonaName, number: number) =>
  scene.call(forecastFileRoute, getForecastFileOperation, { as, ...of(number) });
const faultsOf = (reply: { json: { errors: { pointer: string; detail: string }[] } }) =>
  reply.json.errors.map((fault) => fault.pointer);

const inOrganisation = <T extends object>(sql: string, params: unknown[] = []): Promise<T[]> =>
  transact({ organisationId: scene.organisationId }, (em) => em.execute<T[]>(sql, params));
const runId = async (number: number): Promise<string> =>
  (await inOrganisation<{ id: string }>('select id from forecast_run where number = ?', [number]))[0]!.id;
const jobsOf = async (number: number): Promise<number> =>
  (
    await inOrganisation(`select 1 from pgboss.job where name = 'forecast-run' and data->>'runId' = ?`, [
      await runId(number),
    ])
  ).length;
const compute = async (number: number): Promise<void> =>
  computeForecastRun({ organisationId: scene.organisationId, runId: await runId(number) });

/** What the engine gives for the run's study file, in one thread and by itself. */
async function direct(number: number): Promise<string> {
  const { text } = await studyFile('statistician', number);
  const parsed = parseStudyFile(text);
  if (!parsed.ok) throw new Error('the stored study file is not valid');
  return serialiseForecast(runForecast(parsed.study, { studySha256: createHash('sha256').update(text).digest('hex') }));
}

describe('who may see and run forecasts', () => {
  const status: Record<PersonaName, number[]> = {
    statistician: [200, 404, 404, 404, 404, 422],
    manager: [403, 403, 403, 403, 403, 403],
    coordinator: [403, 403, 403, 403, 403, 403],
    otherCoordinator: [403, 403, 403, 403, 403, 403],
    sponsor: [403, 403, 403, 403, 403, 403],
    owner: [403, 403, 403, 403, 403, 403],
    foreigner: [404, 404, 404, 404, 404, 404],
    stranger: [401, 401, 401, 401, 401, 401],
  };
  it.each(Object.entries(status))('%s', async (as, expected) => {
    const role = as as PersonaName;
    const replies = [
      await list(role),
      await get(role, 99),
      await studyFile(role, 99),
      await forecastFile(role, 99),
      await cancel(role, 99),
      await request(role, { arm: 'A' }),
    ];
    expect(replies.map((reply) => reply.status)).toEqual(expected);
  });
});

describe('a run is refused', () => {
  it('without a plan, then with every fault at once', async () => {
    expect((await request('statistician')).json.detail).toBe(
      'The study has no plan yet. Save the plan as a version, then run a forecast.',
    );
    await savePlan(scene);
    await logSites(scene);
    await cutData(scene);
    const wrong = await request('statistician', { draws: 5, seed: -1, cutoffOn: '31/03/2026', runNumber: 4 });
    expect(wrong.status).toBe(422);
    expect(faultsOf(wrong)).toEqual(['/cutoffOn', '/draws', '/seed', '/runNumber']);
  });

  it('with a cut-off ahead, a cut that is none, or a cut to another day', async () => {
    expect(faultsOf(await request('statistician', { cutoffOn: '2099-01-31' }))).toEqual(['/cutoffOn']);
    expect(faultsOf(await request('statistician', { dataCutNumber: 9 }))).toEqual(['/dataCutNumber']);
    const other = await request('statistician', { dataCutNumber: 1, cutoffOn: '2026-03-31' });
    expect(other.json.errors).toEqual([
      { pointer: '/cutoffOn', detail: 'Data cut 1 is to 30 Apr 2026. Give that day, or choose another cut.' },
    ]);
  });

  it('where the engine can’t take the study file, with pointers into it, and nothing is queued', async () => {
    await savePlan(scene, 2, { ...plan, enrolment: { ...plan.enrolment, countryCaps: [{ country: 'GB', cap: 5 }] } });
    const refused = await request('statistician', { dataCutNumber: 1 });
    expect([refused.status, faultsOf(refused)]).toEqual([422, ['/enrolment/countryCaps']]);
    expect((await list('statistician')).json.total).toBe(0);
    await savePlan(scene, 3);
  });
});

describe('a run', () => {
  it('is queued with the exact study file that it will read, and its job with it', async () => {
    const reply = await request('statistician', { dataCutNumber: 1, draws: 2000, seed: 11 });
    expect(reply.status).toBe(202);
    expect(reply.json).toMatchObject({
      number: 1,
      status: 'queued',
      cutoffOn: CUTOFF,
      planVersion: 3,
      dataCut: 1,
      draws: 2000,
      drawsDone: 0,
      seed: 11,
      failure: null,
    });
    const file = await studyFile('statistician', 1);
    expect(createHash('sha256').update(file.text).digest('hex')).toBe(reply.json.studySha256);
    expect(file.json.enrolment.sites[0]).toEqual({
      code: '101',
      country: 'GB',
      activatedOn: '2026-02-10',
      cap: 40,
      randomised: 3,
      loggedThrough: CUTOFF,
      monthly: [
        { month: '2026-03', randomised: 2 },
        { month: '2026-04', randomised: 1 },
      ],
    });
    expect(file.json.events.subjects).toHaveLength(6);
    expect(file.json.simulation).toEqual({ draws: 2000, seed: 11, horizonMonths: 60 });
    expect(await jobsOf(1)).toBe(1);
    expect((await forecastFile('statistician', 1)).status).toBe(404);
  });

  it('asked for again while it is under way is the same run', async () => {
    const body = { dataCutNumber: 1, draws: 2000, seed: 11 };
    const both = await Promise.all([request('statistician', body), request('statistician', body)]);
    expect(both.map((reply) => reply.json.number)).toEqual([1, 1]);
    expect(await jobsOf(1)).toBe(1);
  });

  it('is one of two at most in an organisation', async () => {
    const second = await request('statistician', { dataCutNumber: 1, draws: 2000, seed: 12 });
    const third = await request('statistician', { dataCutNumber: 1, draws: 2000, seed: 13 });
    expect([second.status, third.status, third.headers.get('retry-after')]).toEqual([202, 429, '30']);
  });

  it('is cancelled once, and its job then does nothing', async () => {
    const replies = [await cancel('statistician', 2), await cancel('statistician', 2)];
    expect(replies.map((reply) => [reply.status, reply.json.status])).toEqual([
      [200, 'cancelled'],
      [200, 'cancelled'],
    ]);
    await compute(2);
    expect((await get('statistician', 2)).json).toMatchObject({ status: 'cancelled', drawsDone: 0, forecast: null });
  });

  it('ends with the forecast that the engine gives by itself, byte for byte', async () => {
    await compute(1);
    const view = (await get('statistician', 1)).json;
    expect(view).toMatchObject({ status: 'done', drawsDone: 2000, failure: null, engineVersion: expect.any(String) });
    expect(view.forecast.milestones.map((one: { code: string }) => one.code)).toEqual(['IA', 'LPI', 'FU6', 'PA']);
    expect(view.context).toMatchObject({
      eventSource: 'subjects',
      sites: { open: 2, reported: 2 },
      before: null,
      moved: null,
      observed: [
        { on: '2026-02-28', randomised: 1, events: 0 },
        { on: '2026-03-31', randomised: 3, events: 0 },
        { on: '2026-04-30', randomised: 6, events: 1 },
      ],
    });
    const file = await forecastFile('statistician', 1);
    expect(file.headers.get('content-disposition')).toMatch(/^attachment; filename="HZM-.*-run-1-forecast\.json"$/);
    expect(file.text).toBe(await direct(1));
  });

  it('ended is left alone by a second job and can’t be cancelled', async () => {
    const before = (await get('statistician', 1)).json;
    await compute(1);
    expect((await get('statistician', 1)).json).toEqual(before);
    const refused = await cancel('statistician', 1);
    expect([refused.status, refused.json.current.status]).toEqual([409, 'done']);
    const rows = await inOrganisation<{ action: string; record_id: string; actor_name: string }>(
      `select action, record_id, actor_name from audit_entry where action like 'forecasts:%' order by sequence`,
    );
    const name = scene.people.statistician.name;
    expect(rows.map((row) => [row.action, row.record_id, row.actor_name])).toEqual([
      ['forecasts:request', '1', name],
      ['forecasts:request', '2', name],
      ['forecasts:cancel', '2', name],
      ['forecasts:compute', '1', 'Kalends'],
    ]);
  });

  it('runs again on the command line to the same bytes', async () => {
    const input = (await studyFile('statistician', 1)).text;
    const outcome = spawnSync('node', ['--import', 'tsx', 'scripts/forecast.ts', '-'], { input, encoding: 'utf8' });
    expect(outcome.status, outcome.stderr).toBe(0);
    expect(outcome.stdout).toBe((await forecastFile('statistician', 1)).text);
  });

  it('whose study file the engine stops on fails with its reason', async () => {
    const number = (await request('statistician', { dataCutNumber: 1, draws: 500 })).json.number as number;
    // A file that a later version of the rules no longer takes.
    await inOrganisation(`update forecast_run set study_file = replace(study_file, '"exponential"', '"unheard-of"') where number = ? returning 1`, [number]); // prettier-ignore
    await compute(number);
    expect((await get('statistician', number)).json).toMatchObject({
      status: 'failed',
      failure: {
        reason: 'The study file is not one that this version computes.',
        errors: [expect.objectContaining({ pointer: '/events/model/family' })],
      },
    });
  });

  it('stands in the list, newest first, with its first milestone', async () => {
    const { items, total } = (await list('statistician', { size: 2, page: 2 })).json;
    expect([total, items.map((run: { number: number }) => run.number)]).toEqual([3, [1]]);
    const forecast = (await get('statistician', 1)).json.forecast;
    expect(items[0].first).toEqual({
      code: 'IA',
      name: 'Interim analysis',
      reachedOn: null,
      probabilityReached: forecast.milestones[0].probabilityReached,
      low: forecast.milestones[0].quantiles['0.1'],
      median: forecast.milestones[0].quantiles['0.5'],
      high: forecast.milestones[0].quantiles['0.9'],
    });
  });

  it('without a cut forecasts enrolment from the log alone', async () => {
    const { number } = (await request('statistician', { cutoffOn: CUTOFF, draws: 500 })).json;
    const file = (await studyFile('statistician', number)).json;
    expect(file.events).toBeUndefined();
    expect(file.milestones.map((one: { code: string }) => one.code)).toEqual(['LPI', 'FU6']);
    await compute(number);
    expect((await get('statistician', number)).json).toMatchObject({
      status: 'done',
      context: { eventSource: 'none', before: { number: 1 } },
    });
  });

  it('of another organisation is not there, whoever guesses its number', async () => {
    const found = await transact({ organisationId: randomUUID() }, (em) => em.execute('select 1 from forecast_run'));
    expect(found).toEqual([]);
  });
});
