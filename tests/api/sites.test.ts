import { beforeAll, describe, expect, it } from 'vitest';
import { PUT as logRoute } from '@/app/api/v1/studies/[code]/log/[site]/[month]/route';
import { GET as getRoute, PUT as changeRoute } from '@/app/api/v1/studies/[code]/sites/[site]/route';
import { POST as acceptRoute } from '@/app/api/v1/studies/[code]/sites/list/accept/route';
import { POST as previewRoute } from '@/app/api/v1/studies/[code]/sites/list/preview/route';
import { GET as listRoute, POST as addRoute } from '@/app/api/v1/studies/[code]/sites/route';
import { transact } from '@/lib/db/transaction';
import { logMonthOperation } from '@/lib/site-log/operations';
import { acceptSiteListOperation, previewSiteListOperation } from '@/lib/site-lists/operations';
import { addSiteOperation, changeSiteOperation, getSiteOperation, listSitesOperation } from '@/lib/sites/operations';
import { listWindows, summariseSites } from '@/lib/sites/queries';
import { createScene, type PersonaName, type Scene } from '@/tests/support/scene';

let scene: Scene;
beforeAll(async () => {
  scene = await createScene();
});

const poznan = {
  code: '107',
  name: 'Lipowa Kidney Clinic',
  city: 'Poznań',
  country: 'PL',
  plannedEarliest: '2026-03-01',
  plannedLikely: '2026-04-01',
  plannedLatest: '2026-06-30',
  activatedOn: null,
  closedOn: null,
  cap: 40,
};
const add = (as: PersonaName, body: object = poznan) => scene.call(addRoute, addSiteOperation, { as, body });
const change = (as: PersonaName, site: string, body: object) =>
  scene.call(changeRoute, changeSiteOperation, { as, params: { site }, body });
const list = (as: PersonaName, query: Record<string, unknown> = {}) =>
  scene.call(listRoute, listSitesOperation, { as, query });
const codes = (reply: { json: { items: { code: string }[] } }) => reply.json.items.map((item) => item.code);
const upload = (as: PersonaName, text: string, kind: 'preview' | 'accept' = 'preview') =>
  scene.call(
    kind === 'preview' ? previewRoute : acceptRoute,
    kind === 'preview' ? previewSiteListOperation : acceptSiteListOperation,
    { as, file: { name: 'sites.csv', text } },
  );

async function trail(): Promise<
  { action: string; record_id: string; changes: { field: string; old: unknown; new: unknown }[]; source: string }[]
> {
  return transact({ organisationId: scene.organisationId }, (em) =>
    em.execute(
      `select action, record_id, changes, source from audit_entry where study_id = ? and action like 'sites:%' order by sequence`,
      [scene.studyId],
    ),
  );
}

describe('who may see and change sites', () => {
  const status: Record<
    PersonaName,
    [list: number, get: number, add: number, change: number, preview: number, accept: number]
  > = {
    statistician: [200, 200, 422, 404, 422, 422],
    manager: [200, 200, 422, 404, 422, 422],
    coordinator: [403, 403, 403, 403, 403, 403],
    otherCoordinator: [403, 403, 403, 403, 403, 403],
    sponsor: [403, 403, 403, 403, 403, 403],
    owner: [403, 403, 403, 403, 403, 403],
    foreigner: [404, 404, 404, 404, 404, 404],
    stranger: [401, 401, 401, 401, 401, 401],
  };
  it.each(Object.entries(status))('%s', async (as, expected) => {
    const role = as as PersonaName;
    const outcomes = [
      await list(role),
      await scene.call(getRoute, getSiteOperation, { as: role, params: { site: '101' } }),
      await add(role, {}),
      await change(role, 'none', { ...poznan, version: 1 }),
      await upload(role, ''),
      await upload(role, '', 'accept'),
    ];
    expect(outcomes.map((reply) => reply.status)).toEqual(expected);
  });
});

describe('adding a site', () => {
  it('stores it with its row in the trail', async () => {
    const added = await add('manager');
    expect(added.status).toBe(201);
    expect(added.json).toMatchObject({ ...poznan, version: 1 });
    const [row] = await trail();
    expect(row).toMatchObject({ action: 'sites:add', record_id: '107', source: 'screen' });
    expect(row!.changes).toContainEqual({ field: 'plannedLikely', old: null, new: '2026-04-01' });
  });

  it('refuses a code of the study in any spelling, with every other fault at once', async () => {
    const twin = await add('manager', {
      ...poznan,
      code: ' 107 ',
      plannedLatest: '2026-01-01',
      closedOn: '2026-05-01',
    });
    expect(twin.status).toBe(422);
    expect(twin.json.errors.map((fault: { pointer: string }) => fault.pointer)).toEqual([
      '/code',
      '/plannedLatest',
      '/closedOn',
    ]);
    expect(twin.json.errors[0].detail).toBe(
      'Site 107 is in this study already: Lipowa Kidney Clinic. Give another code.',
    );
  });

  it('by two at the same instant adds one', async () => {
    const both = await Promise.all([
      add('manager', { ...poznan, code: 'X1' }),
      add('statistician', { ...poznan, code: 'x1' }),
    ]);
    const statuses = both.map((reply) => reply.status).sort();
    expect(statuses[0]).toBe(201);
    expect([409, 422]).toContain(statuses[1]);
  });

  it('refuses unknown fields', async () => {
    const arm = await add('manager', { ...poznan, code: '109', arm: 'A', organisationId: scene.organisationId });
    expect(arm.json.errors.map((fault: { pointer: string }) => fault.pointer)).toEqual(['/arm', '/organisationId']);
  });
});

describe('changing a site', () => {
  it('records what changed, once however often it is sent', async () => {
    const body = { ...poznan, activatedOn: '2026-04-14', version: 1 };
    const [first, second] = [await change('manager', '107', body), await change('manager', '107', body)];
    expect([first.status, second.status, second.json.version]).toEqual([200, 200, 2]);
    const rows = (await trail()).filter((row) => row.action === 'sites:change');
    expect(rows).toEqual([
      expect.objectContaining({ record_id: '107', changes: [{ field: 'activatedOn', old: null, new: '2026-04-14' }] }),
    ]);
  });

  it('with a stale form shows what stands now', async () => {
    const stale = await change('statistician', '107', { ...poznan, cap: 30, version: 1 });
    expect(stale.status).toBe(409);
    expect(stale.json.current).toMatchObject({ activatedOn: '2026-04-14', cap: 40, version: 2 });
  });

  it('obeys what is logged: cap, activation, closure', async () => {
    const site = await scene.call(getRoute, getSiteOperation, { as: 'manager', params: { site: '101' } });
    const { id: _id, ...form } = site.json;
    await scene.call(logRoute, logMonthOperation, {
      as: 'coordinator',
      params: { site: '101', month: '2026-05' },
      body: { version: null, cells: { screened: 6, failed: 1, randomised: 5, events: 0, withdrawn: 0 } },
    });
    const refused = await change('manager', '101', {
      ...form,
      cap: 4,
      activatedOn: '2026-06-01',
      closedOn: '2026-06-01',
    });
    expect(refused.status).toBe(422);
    expect(refused.json.errors).toEqual([
      { pointer: '/activatedOn', detail: 'May 2026 is logged already. Give 31 May 2026 or an earlier day.' },
      { pointer: '/cap', detail: '5 are randomised here already. A cap is at least 5.' },
    ]);
    const early = await change('manager', '101', { ...form, closedOn: '2026-04-30' });
    expect(early.json.errors).toEqual([
      { pointer: '/closedOn', detail: 'Patients are logged in May 2026. Give 1 May 2026 or a later day.' },
    ]);
  });
});

describe('the list', () => {
  it('is found by code, name, city or the country’s name, narrowed by country and status, by code', async () => {
    expect(codes(await list('manager', { search: 'POZNA' }))).toEqual([
      '107',
      ...codes(await list('manager', { search: 'x1' })),
    ]);
    expect(codes(await list('manager', { search: 'united king' }))).toEqual(['101', '102']);
    expect(codes(await list('manager', { country: 'GB', status: 'open' }))).toEqual(['101', '102']);
    expect(codes(await list('manager', { status: 'overdue' })).map((code) => code.toLowerCase())).toEqual(['x1']);
    expect(codes(await list('manager', { search: '%' }))).toEqual([]);
    expect((await list('manager', { sort: 'randomised' })).status).toBe(422);
  });

  it('has pages', async () => {
    const second = await list('manager', { page: 2, size: 1 });
    expect(second.json).toMatchObject({ page: 2, size: 1, total: 4 });
    expect(codes(second)).toEqual(['102']);
  });

  it('counts randomised and the months missing since the activation', async () => {
    const [row] = (await list('manager', { search: '101' })).json.items;
    const now = new Date();
    const over = (now.getUTCFullYear() - 2026) * 12 + now.getUTCMonth() - 1;
    expect(row).toMatchObject({ randomised: 5, status: 'open', monthsMissing: over - 1, monthsIncomplete: 0 });
  });

  it('is summed up, with the windows still to open', async () => {
    await add('manager', {
      ...poznan,
      code: '900',
      plannedEarliest: '2099-01-01',
      plannedLikely: '2099-02-01',
      plannedLatest: '2099-03-01',
    });
    const { summary, windows } = await scene.act('manager', 'sites:read', async (scope, context) => ({
      summary: await summariseSites(scope, context),
      windows: await listWindows(scope, context),
    }));
    expect(summary).toMatchObject({
      total: 5,
      byStatus: { open: 3, overdue: 1, 'to-open': 1, closed: 0 },
      countries: ['PL', 'GB'],
      randomised: 5,
    });
    expect(windows.items.map((one) => [one.code.toLowerCase(), one.overdue])).toEqual([
      ['x1', true],
      ['900', false],
    ]);
  });
});

describe('a site list', () => {
  const head = 'code,name,city,country,earliest,likely,latest,activated,closed,cap';
  const good = `${head}\n201,Elm House,Leith,GB,2027-05-01,2027-05-31,2027-08-29,,,\n202,Ash House,Leith,GB,,,,14 Mar 2026,,30`;

  it('is previewed without storing anything', async () => {
    const before = await list('manager');
    const preview = await upload('manager', good);
    expect(preview.status).toBe(200);
    expect(preview.json).toMatchObject({ total: 2, open: 1, toOpen: 1, countries: ['GB'] });
    expect((await list('manager')).json.total).toBe(before.json.total);
  });

  it('is refused with every fault, the codes of the study included, and then nothing is stored', async () => {
    const before = (await list('manager')).json.total;
    const wrong = await upload(
      'manager',
      `${head}\n203,Oak House,Leith,ZZ,,,,03/04/26,,\n204,,Leith,GB,,,,2026-03-14,,x`,
      'accept',
    );
    expect(wrong.status).toBe(422);
    expect(wrong.json.errors.map((fault: { pointer: string }) => fault.pointer)).toEqual([
      '/rows/2/activated',
      '/rows/3/cap',
    ]);
    const present = await upload('manager', `${good}\n101,Clinic,Leith,GB,,,,2026-03-14,,`, 'accept');
    expect(present.json.errors).toEqual([
      { pointer: '/rows/4/code', detail: expect.stringContaining('101 is in this study already') },
    ]);
    expect((await upload('manager', 'code,name,city,country,ARM\n1,a,b,GB,x')).json.detail).toMatch(
      /carries treatment\. This product is blinded/,
    );
    expect((await list('manager')).json.total).toBe(before);
  });

  it('is added whole, once, with one row in the trail that holds it all', async () => {
    const accepted = await upload('manager', good, 'accept');
    expect([accepted.status, accepted.json.added]).toEqual([201, 2]);
    const again = await upload('manager', good, 'accept');
    expect(again.status).toBe(422);
    const rows = (await trail()).filter((row) => row.action === 'sites:add-list');
    expect(rows).toHaveLength(1);
    expect(rows[0]).toMatchObject({ source: 'upload', record_id: 'sites.csv' });
    expect(rows[0]!.changes).toContainEqual({
      field: 'site 202',
      old: null,
      new: expect.objectContaining({ activatedOn: '2026-03-14', cap: 30 }),
    });
    expect((await list('manager', { search: '202' })).json.items[0]).toMatchObject({
      status: 'open',
      cap: 30,
      version: 1,
    });
  });
});
