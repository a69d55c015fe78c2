import { randomUUID } from 'node:crypto';
import { beforeAll, describe, expect, it } from 'vitest';
import { GET as comparisonRoute } from '@/app/api/v1/studies/[code]/plan/comparison/route';
import { PUT as sectionRoute } from '@/app/api/v1/studies/[code]/plan/draft/route';
import { GET as planRoute } from '@/app/api/v1/studies/[code]/plan/route';
import { GET as versionRoute } from '@/app/api/v1/studies/[code]/plan/versions/[number]/route';
import { POST as saveVersionRoute } from '@/app/api/v1/studies/[code]/plan/versions/route';
import { GET as studyRoute } from '@/app/api/v1/studies/[code]/route';
import { GET as listRoute, POST as createRoute } from '@/app/api/v1/studies/route';
import { transact } from '@/lib/db/transaction';
import { listStudiesOperation } from '@/lib/portfolio/operations';
import {
  comparePlanVersionsOperation,
  createStudyOperation,
  getPlanOperation,
  getPlanVersionOperation,
  getStudyOperation,
  savePlanSectionOperation,
  savePlanVersionOperation,
} from '@/lib/studies/operations';
import { createScene, type PersonaName, type Scene } from '@/tests/support/scene';

let scene: Scene;
beforeAll(async () => {
  scene = await createScene();
});

const enrolment = { target: 900, rate: { meanPerMonth: 1.55, cv: 0.7, basis: 'plan' } };
const events = {
  model: { family: 'exponential', medianMonths: 26, basis: 'data', priorEvents: 5 },
  dropout: { perMonth: 0.008, basis: 'data', priorEvents: 5 },
};
const milestones = [
  { code: 'LPI', name: 'Last patient in', kind: 'randomised', count: 900, plannedOn: '2028-11-30' },
  { code: 'IA', name: 'Interim analysis', kind: 'events', count: 180, plannedOn: '2029-01-31' },
];
const simulation = { draws: 1000, seed: 1, horizonMonths: 120 };

const plan = (as: PersonaName = 'statistician') => scene.call(planRoute, getPlanOperation, { as });
const section = (name: string, value: unknown, version = 0, as: PersonaName = 'statistician') =>
  scene.call(sectionRoute, savePlanSectionOperation, { as, body: { section: name, version, value } });
const saveVersion = (body: object, as: PersonaName = 'statistician') =>
  scene.call(saveVersionRoute, savePlanVersionOperation, { as, body });
const version = (number: number, as: PersonaName = 'statistician') =>
  scene.call(versionRoute, getPlanVersionOperation, { as, params: { number } });
const compare = (query: object, as: PersonaName = 'statistician') =>
  scene.call(comparisonRoute, comparePlanVersionsOperation, { as, query: query as Record<string, unknown> });
const list = (as: PersonaName, query: Record<string, unknown> = {}) =>
  scene.call(listRoute, listStudiesOperation, { as, query });
const frame = (as: PersonaName) => scene.call(studyRoute, getStudyOperation, { as });

async function sectionVersions(): Promise<Record<string, number>> {
  const { sections } = (await plan()).json;
  return Object.fromEntries(
    Object.entries(sections as Record<string, { version: number }>).map(([key, one]) => [key, one.version]),
  );
}

interface TrailRow {
  action: string;
  record_id: string;
  changes: { field: string; old: unknown; new: unknown }[];
  reason: string | null;
}

const trail = (prefix = 'plan:%'): Promise<TrailRow[]> =>
  transact({ organisationId: scene.organisationId }, (em) =>
    em.execute<TrailRow[]>(
      `select action, record_id, changes, reason from audit_entry where study_id = ? and action like ? order by sequence`,
      [scene.studyId, prefix],
    ),
  );

describe('who may see and save a plan', () => {
  const status: Record<PersonaName, [list: number, study: number, plan: number, version: number, compare: number, section: number, save: number, create: number]> = {
    statistician: [200, 200, 200, 404, 404, 422, 422, 403],
    manager: [200, 200, 200, 404, 404, 403, 403, 403],
    coordinator: [200, 200, 403, 403, 403, 403, 403, 403],
    otherCoordinator: [200, 200, 403, 403, 403, 403, 403, 403],
    sponsor: [200, 200, 403, 403, 403, 403, 403, 403],
    owner: [200, 200, 403, 403, 403, 403, 403, 422],
    foreigner: [200, 404, 404, 404, 404, 404, 404, 403],
    stranger: [401, 401, 401, 401, 401, 401, 401, 401],
  }; // prettier-ignore
  it.each(Object.entries(status))('%s', async (as, expected) => {
    const role = as as PersonaName;
    const outcomes = [
      await list(role),
      await frame(role),
      await plan(role),
      await version(1, role),
      await compare({ from: 1, to: 2 }, role),
      await section('enrolment', {}, 0, role),
      await saveVersion({}, role),
      await scene.call(createRoute, createStudyOperation, { as: role, body: {} }),
    ];
    expect(outcomes.map((reply) => reply.status)).toEqual(expected);
  });
});

describe('a plan, from its first section to its second version', () => {
  it('begins empty, with its sites', async () => {
    const { json } = await plan();
    expect(json).toMatchObject({ current: null, draft: null, saved: [], versions: [], hasRun: false, maySave: true });
    expect(json.sites).toEqual([
      { code: '101', country: 'GB', earliest: '2026-02-10', likely: '2026-02-10', latest: '2026-02-10', cap: 40 },
      { code: '102', country: 'GB', earliest: '2026-02-10', likely: '2026-02-10', latest: '2026-02-10', cap: 40 },
    ]);
  });

  it('refuses a section with every fault at once, and stores nothing of it', async () => {
    const wrong = await section('enrolment', {
      target: 0,
      rate: { meanPerMonth: -1, cv: 0.7, basis: 'plan' },
      arm: 'A',
    });
    expect(wrong.status).toBe(422);
    expect(wrong.json.errors.map((fault: { pointer: string }) => fault.pointer).sort()).toEqual([
      '/value/arm',
      '/value/rate/meanPerMonth',
      '/value/target',
    ]);
    expect((await plan()).json.saved).toEqual([]);
  });

  it('refuses a section that there is not, and members that nobody asked for', async () => {
    expect((await section('sites', [])).status).toBe(422);
    const reply = await scene.call(sectionRoute, savePlanSectionOperation, {
      as: 'statistician',
      body: { section: 'simulation', version: 0, value: simulation, organisationId: scene.organisationId },
    });
    expect(reply.json.errors[0].pointer).toBe('/organisationId');
  });

  it('saves a section once, however often it is sent', async () => {
    const [first, second] = await Promise.all([section('enrolment', enrolment), section('enrolment', enrolment)]);
    expect([first!.status, second!.status]).toEqual([200, 200]);
    expect([first!.json.version, second!.json.version]).toEqual([1, 1]);
    const rows = await trail();
    expect(rows).toHaveLength(1);
    expect(rows[0]).toMatchObject({ action: 'plan:save-section', record_id: 'enrolment' });
    expect(rows[0]!.changes).toContainEqual({ field: 'enrolment.target', old: null, new: 900 });
  });

  it('shows what stands to whoever comes with an old version', async () => {
    const late = await section('enrolment', { ...enrolment, target: 700 }, 0);
    expect(late.status).toBe(409);
    expect(late.json.current).toMatchObject({
      section: 'enrolment',
      version: 1,
      value: enrolment,
      savedBy: scene.people.statistician.name,
    });
    expect((await section('enrolment', { ...enrolment, target: 960 }, 1)).json.version).toBe(2);
    expect((await section('enrolment', enrolment, 2)).json.version).toBe(3);
  });

  it('lets one of many different saves at the same instant win', async () => {
    const replies = await Promise.all(
      Array.from({ length: 8 }, (_, place) => section('simulation', { ...simulation, seed: place + 1 }, 0)),
    );
    expect(replies.map((reply) => reply.status).sort()).toEqual([200, ...Array<number>(7).fill(409)]);
    const stands = (await plan()).json.sections.simulation;
    await section('simulation', simulation, stands.version);
  });

  it('is no version before every section is there, and says which are missing', async () => {
    const body = { baseNumber: 0, sectionVersions: await sectionVersions() };
    const early = await saveVersion(body);
    expect(early.status).toBe(422);
    expect(early.json.errors.map((fault: { pointer: string }) => fault.pointer)).toEqual(['/events', '/milestones']);
  });

  it('is no version while its sections contradict each other', async () => {
    await section('events', null, 0);
    await section('milestones', [{ ...milestones[0], count: 901 }, milestones[1]], 0);
    const reply = await saveVersion({ baseNumber: 0, sectionVersions: await sectionVersions() });
    expect(reply.json.errors.map((fault: { pointer: string }) => fault.pointer)).toEqual([
      '/milestones/0/count',
      '/milestones/1/kind',
    ]);
    await section('events', events, 1);
    await section('milestones', milestones, 1);
  });

  it('becomes version 1 by a press, and by two presses', async () => {
    const body = { baseNumber: 0, sectionVersions: await sectionVersions() };
    const [first, second] = await Promise.all([saveVersion(body), saveVersion(body)]);
    expect([first!.status, second!.status]).toEqual([201, 201]);
    expect([first!.json.number, second!.json.number]).toEqual([1, 1]);
    const { json } = await plan();
    expect(json.current.plan).toEqual({ enrolment, events, milestones, simulation });
    expect(json.draft).toBeNull();
    expect((await trail('plan:save-version')).map((row) => row.record_id)).toEqual(['1']);
  });

  it('is not saved over somebody else’s version or section', async () => {
    const before = await sectionVersions();
    await section('enrolment', { ...enrolment, target: 950 }, before.enrolment!);
    const stale = await saveVersion({ baseNumber: 1, sectionVersions: before });
    expect(stale.status).toBe(409);
    expect(stale.json.current.sections).toMatchObject([{ section: 'enrolment', value: { target: 950 } }]);
    const unseen = await saveVersion({ baseNumber: 1, sectionVersions: { ...before, enrolment: 99 } });
    expect(unseen.status).toBe(409);
    const old = await saveVersion({ baseNumber: 0, sectionVersions: await sectionVersions() });
    expect(old.status).toBe(409);
    expect(old.json.current.version.number).toBe(1);
  });

  it('needs a reason once a run exists', async () => {
    await addRun();
    const body = { baseNumber: 1, sectionVersions: await sectionVersions() };
    const without = await saveVersion(body);
    expect(without.json.errors.map((fault: { pointer: string }) => fault.pointer)).toEqual(['/reasonKind', '/reason']);
    const saved = await saveVersion({
      ...body,
      reasonKind: 'protocol-amendment',
      reason: 'Amendment 2 raises the target.',
    });
    expect(saved.json).toMatchObject({
      number: 2,
      reasonKind: 'protocol-amendment',
      reason: 'Amendment 2 raises the target.',
    });
    const rows = await trail('plan:save-version');
    expect(rows.at(-1)).toMatchObject({ record_id: '2', reason: 'protocol amendment: Amendment 2 raises the target.' });
    expect(rows.at(-1)!.changes).toEqual([{ field: 'enrolment.target', old: 900, new: 950 }]);
  });

  it('is not told to be saved when somebody else saved another one', async () => {
    const stale = { ...(await sectionVersions()), enrolment: 1 };
    expect((await saveVersion({ baseNumber: 2, sectionVersions: stale })).status).toBe(409);
  });

  it('keeps its versions: each is read as it was, and two are compared', async () => {
    expect((await version(1)).json.plan.enrolment.target).toBe(900);
    expect((await version(3)).status).toBe(404);
    const compared = await compare({ from: 1, to: 2 }, 'manager');
    expect(compared.json.differences).toEqual([
      { field: 'enrolment.target', label: 'Patients to randomise', old: '900', new: '950' },
    ]);
    expect((await compare({ from: 'x', to: 0 })).json.errors).toHaveLength(2);
    await expect(
      transact({ organisationId: scene.organisationId }, (em) =>
        em.execute(`update plan_version set reason = 'changed' where study_id = ?`, [scene.studyId]),
      ),
    ).rejects.toThrow(/permission denied|kept as they were written/);
  });
});

/** A queued run, as the forecasts domain would leave it: enough for "a run exists". */
async function addRun(): Promise<void> {
  await transact({ organisationId: scene.organisationId }, async (em) => {
    const [planVersion] = await em.execute<{ id: string }[]>(`select id from plan_version where study_id = ?`, [
      scene.studyId,
    ]);
    await em.execute(
      `insert into forecast_run (id, organisation_id, study_id, number, status, cutoff_on, plan_version_id, draws, seed, study_file, study_sha256, requested_at, requested_by)
       values (?, ?, ?, 1, 'queued', '2026-10-31', ?, 1000, 1, '{}', 'x', now(), ?)`,
      [randomUUID(), scene.organisationId, scene.studyId, planVersion!.id, scene.people.statistician.personId],
    );
  });
}

describe('creating a study', () => {
  const body = { code: 'NEW-1', title: 'Ostrelin, long-term', sponsorName: 'Tarn Medicines' };
  const create = (given: object = body) => scene.call(createRoute, createStudyOperation, { as: 'owner', body: given });

  it('is the owner’s, with its row in the trail; a code is taken once, in any spelling', async () => {
    const [first, second] = [await create(), await create({ ...body, code: 'new-1' })];
    expect([first.status, second.status]).toEqual([201, 409]);
    expect(second.json.detail).toContain('has a study NEW-1 already');
    const rows = await transact({ organisationId: scene.organisationId }, (em) =>
      em.execute<TrailRow[]>(
        `select action, record_id, changes from audit_entry where action = 'studies:create' order by sequence`,
      ),
    );
    expect(rows.map((row) => row.record_id)).toEqual(['NEW-1']);
    expect(rows[0]!.changes).toContainEqual({ field: 'sponsorName', old: null, new: 'Tarn Medicines' });
  });

  it('by two at one instant makes one', async () => {
    const twice = { ...body, code: 'NEW-2' };
    const statuses = (await Promise.all([create(twice), create(twice)])).map((reply) => reply.status).sort();
    expect(statuses).toEqual([201, 409]);
  });
});

describe('the list of studies', () => {
  const codes = (reply: { json: { items: { code: string }[] } }) => reply.json.items.map((item) => item.code);

  it('shows each person theirs and no other', async () => {
    expect(codes(await list('statistician'))).toEqual([scene.studyCode]);
    expect(codes(await list('foreigner'))).toEqual([scene.foreignStudyCode]);
    expect(codes(await list('owner', { order: 'code' }))).toEqual([scene.studyCode, 'NEW-1', 'NEW-2']);
    expect(codes(await list('owner', { search: 'LONG-term' }))).toEqual(['NEW-1', 'NEW-2']);
    expect((await list('owner', { search: 'long-term' })).json).toMatchObject({ total: 2, all: 3 });
  });

  it('holds what each role may see', async () => {
    const [statistician, coordinator, sponsor, owner] = await Promise.all(
      (['statistician', 'coordinator', 'sponsor', 'owner'] as const).map(
        async (as) => (await list(as, { search: scene.studyCode })).json.items[0],
      ),
    );
    expect(statistician).toMatchObject({ role: 'statistician', run: { number: 1, status: 'queued' }, site: null });
    expect(statistician.milestones.map((one: { code: string }) => one.code)).toEqual(['LPI', 'IA']);
    expect(coordinator).toMatchObject({
      role: 'coordinator',
      run: null,
      milestones: [],
      planSavedOn: null,
      counts: null,
    });
    expect(coordinator.site).toMatchObject({ code: '101', name: 'Clinic 101' });
    expect(coordinator.site.monthsDue).toBeGreaterThan(0);
    expect(sponsor).toMatchObject({ role: 'sponsor', run: null, milestones: [], planSavedOn: null, published: null });
    expect(owner).toMatchObject({ role: 'owner', standing: 'no-view', run: null, milestones: [], counts: null });
  });

  it('refuses an order that there is not', async () => {
    expect((await list('owner', { order: 'title; drop table study' })).status).toBe(422);
  });
});

describe('the frame around a study', () => {
  it('lists the sections of each role, with what stands in them', async () => {
    const sections = async (as: PersonaName) =>
      ((await frame(as)).json.rail as { section: string }[]).map((one) => one.section);
    expect(await sections('statistician')).toEqual([
      'plan',
      'sites',
      'log',
      'data-cuts',
      'forecasts',
      'timeline',
      'alerts',
      'people',
      'audit',
    ]);
    expect(await sections('manager')).toEqual(['plan', 'sites', 'log', 'timeline', 'people']);
    expect(await sections('coordinator')).toEqual(['log']);
    expect(await sections('sponsor')).toEqual(['timeline']);
    expect(await sections('owner')).toEqual(['people', 'audit']);
    const { rail } = (await frame('statistician')).json;
    const value = (section: string) => rail.find((one: { section: string }) => one.section === section);
    expect(value('plan').value).toBe('version 2');
    expect(value('sites').value).toBe('2 of 2');
    expect(value('log')).toMatchObject({ caution: true, value: expect.stringMatching(/^\d+ due$/) });
    expect(value('forecasts').value).toBe('run 1');
    expect(value('people').value).toBe('5');
  });
});
