import { createHash } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { GET as fileRoute } from '@/app/api/v1/studies/[code]/data-cuts/[number]/file/route';
import { GET as getRoute } from '@/app/api/v1/studies/[code]/data-cuts/[number]/route';
import { POST as aggregateRoute } from '@/app/api/v1/studies/[code]/data-cuts/aggregate/route';
import { POST as previewRoute } from '@/app/api/v1/studies/[code]/data-cuts/preview/route';
import { GET as listRoute, POST as acceptRoute } from '@/app/api/v1/studies/[code]/data-cuts/route';
import {
  acceptAggregateOperation,
  acceptCutOperation,
  getCutFileOperation,
  getCutOperation,
  listCutsOperation,
  previewCutOperation,
} from '@/lib/data-cuts/operations';
import { transact } from '@/lib/db/transaction';
import { logMonth } from '@/lib/site-log/commands';
import { type LocalServer, startLocalServer } from '@/tests/machine/local-servers';
import { createScene, type PersonaName, type Scene } from '@/tests/support/scene';

let scene: Scene;
let store: LocalServer;
const keys = { S3_ACCESS_KEY: 'access-of-this-test', S3_SECRET_KEY: 'secret-of-this-test' };

beforeAll(async () => {
  store = await startLocalServer('local-files', (folder) => ({ ...keys, KALENDS_FILES_FOLDER: folder }));
  Object.assign(process.env, keys, { S3_ENDPOINT: `http://127.0.0.1:${store.port}` });
  scene = await createScene();
});
afterAll(() => store.stop());

const head = 'subject,site,randomised on,status,status on';
const listing = [
  head,
  '0001,101,2026-03-02,event,2026-04-12',
  '0002,101,2026-03-20,at-risk,2026-04-30',
  '0003,102,2026-04-02,withdrawn,2026-04-28',
].join('\n');
const cutoffOn = '2026-04-30';

const send = (kind: 'preview' | 'accept', as: PersonaName, text: string | Uint8Array, body: object = { cutoffOn }) =>
  scene.call(
    kind === 'preview' ? previewRoute : acceptRoute,
    kind === 'preview' ? previewCutOperation : acceptCutOperation,
    { as, file: { name: '../listing.csv', ...(typeof text === 'string' ? { text } : { bytes: text }) }, body },
  );
const totals = { cutoffOn, events: 1, withdrawn: 1, atRisk: 1, personMonths: 4.5 };
const aggregate = (as: PersonaName, body: object = totals) =>
  scene.call(aggregateRoute, acceptAggregateOperation, { as, body });
const list = (as: PersonaName) => scene.call(listRoute, listCutsOperation, { as });
const get = (as: PersonaName, number: number) => scene.call(getRoute, getCutOperation, { as, params: { number } });
const download = (as: PersonaName, number: number) =>
  scene.call(fileRoute, getCutFileOperation, { as, params: { number } });

const rowsOf = (table: string): Promise<number> =>
  transact({ organisationId: scene.organisationId }, async (em) => {
    const [row] = await em.execute<{ count: number }[]>(`select count(*)::int as count from ${table}`);
    return row!.count;
  });

const log = (as: 'coordinator' | 'otherCoordinator', site: string, month: string, randomised: number) =>
  scene.act(
    as,
    'site-log:log',
    (scope, context) =>
      logMonth(
        scope,
        {
          params: { site, month },
          body: {
            version: null,
            source: 'screen',
            cells: { screened: randomised + 2, failed: 1, randomised, events: 0, withdrawn: 0 },
          },
        },
        context,
      ),
    '2026-06-02T09:00:00Z',
  );

describe('who may see and accept data cuts', () => {
  const status: Record<PersonaName, number[]> = {
    statistician: [200, 404, 404, 422, 422, 422],
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
      await download(role, 99),
      await send('preview', role, ''),
      await send('accept', role, ''),
      await aggregate(role, {}),
    ];
    expect(replies.map((reply) => reply.status)).toEqual(expected);
  });
});

describe('a preview', () => {
  it('counts, shows, compares with the log and stores nothing', async () => {
    await log('coordinator', '101', '2026-03', 2);
    await log('otherCoordinator', '102', '2026-04', 2);
    const reply = await send('preview', 'statistician', listing);
    expect(reply.status).toBe(200);
    expect(reply.json).toMatchObject({
      fileName: 'listing.csv',
      form: 'own',
      rows: 3,
      faultCount: 0,
      counts: { subjects: 3, byStatus: { event: 1, withdrawn: 1, 'at-risk': 1 } },
      noteNeeded: true,
      sites: [
        { site: '101', listed: 2, logged: 2, notLogged: 0, agrees: true },
        { site: '102', listed: 1, logged: 2, notLogged: 0, agrees: false },
      ],
    });
    expect(reply.json.subjects[0]).toEqual({
      id: '0001',
      site: '101',
      randomisedOn: '2026-03-02',
      status: 'event',
      statusOn: '2026-04-12',
    });
    expect(reply.headers.get('cache-control')).toBe('no-store');
    expect(await rowsOf('data_cut')).toBe(0);
  });

  it('shows the faults of the rows, which acceptance refuses with the same words', async () => {
    const wrong = `${listing}\n0003,999,2026-02-01,event,2026-05-01`;
    const shown = await send('preview', 'statistician', wrong);
    expect(shown.json.faultCount).toBe(3);
    expect(shown.json.faults[0]).toMatchObject({ row: 5, column: 'site', value: '999' });
    const refused = await send('accept', 'statistician', wrong);
    expect(refused.status).toBe(422);
    expect(refused.json.detail).toBe('3 things need to be put right.');
    expect(refused.json.errors.map((fault: { pointer: string }) => fault.pointer)).toEqual([
      '/rows/5/site',
      '/rows/5/status on',
      '/rows/5/subject',
    ]);
    expect(refused.json.errors[0].detail).toBe(
      'Row 5, site, “999”: The study has no site 999. Correct the code, or add the site first.',
    );
  });

  it('refuses an arm’s column by name and keeps nothing of it', async () => {
    for (const kind of ['preview', 'accept'] as const) {
      const reply = await send(kind, 'statistician', `${head},TRT01P\n0001,101,2026-03-02,event,2026-04-12,X`);
      expect(reply.status).toBe(422);
      expect(reply.json.errors[0]).toEqual({
        pointer: '/columns/6',
        detail:
          'Column 6, “TRT01P”, carries treatment. This product is blinded: no treatment arm is stored, asked for or shown. Send the file without it.',
      });
    }
    expect([await rowsOf('data_cut'), await rowsOf('data_cut_subject')]).toEqual([0, 0]);
  });

  it('refuses a cut-off ahead, unknown fields and a file over 10 MB', async () => {
    const ahead = await send('preview', 'statistician', listing, { cutoffOn: '2099-01-31' });
    expect(ahead.json.errors[0]).toMatchObject({ pointer: '/cutoffOn', detail: expect.stringContaining('lies ahead') });
    const arm = await send('preview', 'statistician', listing, { cutoffOn, arm: 'A' });
    expect(arm.json.errors[0].pointer).toBe('/arm');
    const large = await send('preview', 'statistician', new Uint8Array(10 * 1024 * 1024 + 1).fill(65));
    expect(large.status).toBe(413);
  });
});

describe('an accepted cut', () => {
  const note = 'Site 102 logged a patient who was randomised in error.';

  it('needs a note where listing and log disagree', async () => {
    const reply = await send('accept', 'statistician', listing);
    expect(reply.status).toBe(422);
    expect(reply.json.errors).toEqual([
      { pointer: '/note', detail: 'Listing and log disagree at 1 site (102). Say in a note why they differ.' },
    ]);
  });

  it('is numbered, keeps its rows and its note, and stands in the trail with its SHA-256', async () => {
    const reply = await send('accept', 'statistician', listing, { cutoffOn, note });
    const sha256 = createHash('sha256').update(listing).digest('hex');
    expect(reply.status).toBe(201);
    expect(reply.json).toMatchObject({
      number: 1,
      cutoffOn,
      kind: 'subjects',
      note,
      file: { name: 'listing.csv', sha256, bytes: listing.length },
      differences: [{ site: '102', listed: 1, logged: 2, notLogged: 0 }],
      runs: [],
    });
    expect(await rowsOf('data_cut_subject')).toBe(3);
    const [entry] = await transact({ organisationId: scene.organisationId }, (em) =>
      em.execute<{ record_id: string; changes: object[]; reason: string; source: string }[]>(
        `select record_id, changes, reason, source from audit_entry where action = 'data-cuts:accept'`,
      ),
    );
    expect(entry).toMatchObject({ record_id: '1', reason: note, source: 'upload' });
    expect(entry!.changes).toContainEqual({ field: 'sha256', old: null, new: sha256 });
  });

  it('sent twice is one cut', async () => {
    const both = await Promise.all([
      send('accept', 'statistician', listing, { cutoffOn, note }),
      send('accept', 'statistician', listing, { cutoffOn, note }),
    ]);
    expect(both.map((reply) => reply.json.number)).toEqual([1, 1]);
    expect(await rowsOf('data_cut')).toBe(1);
  });

  it('gives its file back byte for byte', async () => {
    const reply = await download('statistician', 1);
    expect(reply.text).toBe(listing);
    expect(reply.headers.get('cache-control')).toBe('no-store');
    expect(reply.headers.get('content-disposition')).toMatch(/^attachment; filename="HZM-.*-data-cut-1\.csv"$/);
  });

  it('can’t be changed or removed, not even past the product', async () => {
    for (const statement of [
      `update data_cut set cutoff_on = '2026-05-01'`,
      `delete from data_cut`,
      `update data_cut_subject set status = 'event'`,
      `delete from data_cut_subject`,
    ]) {
      const work = transact({ organisationId: scene.organisationId }, (em) => em.execute(statement));
      await expect(work, statement).rejects.toThrow();
    }
  });

  it('may be of totals, compared with the log as a whole', async () => {
    const refused = await aggregate('statistician', { ...totals, events: -1, personMonths: 1e9 });
    expect(refused.json.errors.map((fault: { pointer: string }) => fault.pointer)).toEqual([
      '/events',
      '/personMonths',
    ]);
    const bare = await aggregate('statistician');
    expect(bare.json.errors).toEqual([
      {
        pointer: '/note',
        detail: 'The totals make 3 subjects, the log has 4 randomised. Say in a note why they differ.',
      },
    ]);
    const accepted = [
      await aggregate('statistician', { ...totals, note: 'As above.' }),
      await aggregate('statistician', { ...totals, note: 'As above.' }),
    ];
    expect(accepted.map((reply) => [reply.status, reply.json.number])).toEqual([
      [201, 2],
      [201, 2],
    ]);
    expect(accepted[0]!.json).toMatchObject({
      kind: 'aggregate',
      file: null,
      aggregate: { events: 1, withdrawn: 1, atRisk: 1, personMonths: 4.5 },
    });
    expect((await download('statistician', 2)).status).toBe(404);
    expect((await list('statistician')).json.items.map((cut: { number: number }) => cut.number)).toEqual([2, 1]);
  });

  it('takes two hundred thousand subjects in one file', async () => {
    const rows = Array.from({ length: 200_000 }, (_, place) => `S${place},101,2026-05-02,at-risk,2026-05-31`);
    const large = [head, ...rows].join('\n');
    const body = { cutoffOn: '2026-05-31', note: 'A listing to see what fits.' };
    const before = await rowsOf('data_cut_subject');
    const started = performance.now();
    const shown = await send('preview', 'statistician', large, { cutoffOn: body.cutoffOn });
    expect(shown.json.counts.subjects).toBe(200_000);
    expect(performance.now() - started).toBeLessThan(5_000);
    const reply = await send('accept', 'statistician', large, body);
    expect([reply.status, reply.json.counts.subjects]).toEqual([201, 200_000]);
    expect(await rowsOf('data_cut_subject')).toBe(before + 200_000);
  }, 60_000);
});
