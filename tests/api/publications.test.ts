import { beforeAll, describe, expect, it } from 'vitest';
import { POST as acknowledgeRoute } from '@/app/api/v1/studies/[code]/publications/[number]/acknowledgement/route';
import { GET as getRoute } from '@/app/api/v1/studies/[code]/publications/[number]/route';
import { GET as listRoute, POST as publishRoute } from '@/app/api/v1/studies/[code]/publications/route';
import { transact } from '@/lib/db/transaction';
import {
  acknowledgeOperation,
  getPublicationOperation,
  listPublicationsOperation,
  publishForecastOperation,
} from '@/lib/publications/operations';
import { countReaders } from '@/lib/publications/queries';
import { addPlan, addRun } from '@/tests/api/publications-scene';
import { FORBIDDEN, shifted } from '@/tests/domain/publications-fixture';
import { asAdmin } from '@/tests/support/database';
import { createScene, type PersonaName, type Scene } from '@/tests/support/scene';

let scene: Scene;
let planVersionId: string;
beforeAll(async () => {
  scene = await createScene();
  planVersionId = await addPlan(scene);
  await addRun(scene, { planVersionId, number: 1 });
  await addRun(scene, { planVersionId, number: 2, change: (one) => shifted(one, 16) });
  await addRun(scene, { planVersionId, number: 3, status: 'failed' });
  await addRun(scene, { planVersionId, number: 4 });
});

const NOTE = 'March brought 14 events where about 17 were expected. Eight sites open later.';
const publish = (as: PersonaName, runNumber: number, body: object = {}) =>
  scene.call(publishRoute, publishForecastOperation, { as, body: { runNumber, note: NOTE, confirm: true, ...body } });
const read = (as: PersonaName, number: number) =>
  scene.call(getRoute, getPublicationOperation, { as, params: { number } });
const list = (as: PersonaName, query: Record<string, unknown> = {}) =>
  scene.call(listRoute, listPublicationsOperation, { as, query });
const acknowledge = (as: PersonaName, number: number) =>
  scene.call(acknowledgeRoute, acknowledgeOperation, { as, params: { number } });
const rows = <T>(sql: string, values: unknown[] = []): Promise<T[]> =>
  transact({ organisationId: scene.organisationId }, (em) => em.execute<T[]>(sql, values));
const pointers = (reply: { json: { errors: { pointer: string }[] } }) =>
  reply.json.errors.map(({ pointer }) => pointer).sort();

describe('publishing', () => {
  it('is refused without a note and a confirmation, with fields that do not exist, and for a run that is not done', async () => {
    const bare = await scene.call(publishRoute, publishForecastOperation, {
      as: 'statistician',
      body: { note: ' ', publishedAt: '2027-01-01', arm: 'A' },
    });
    expect(bare.status).toBe(422);
    expect(pointers(bare)).toEqual(['/arm', '/confirm', '/note', '/publishedAt', '/runNumber']);
    for (const number of [3, 99]) {
      const reply = await publish('statistician', number);
      expect([number, reply.status, pointers(reply)]).toEqual([number, 422, ['/runNumber']]);
    }
    expect((await list('statistician')).json.total).toBe(0);
  });

  it('a double click publishes once and answers the same twice', async () => {
    const both = await Promise.all([publish('statistician', 1), publish('statistician', 1)]);
    expect(both.map((reply) => reply.status)).toEqual([201, 201]);
    expect(both[0]!.json).toEqual(both[1]!.json);
    expect(both[0]!.json).toMatchObject({ number: 1, note: NOTE, supersededBy: null });
    expect((await list('statistician')).json.total).toBe(1);
    expect(
      await rows(`select 1 from audit_entry where study_id = ? and action = 'publications:publish'`, [scene.studyId]),
    ).toHaveLength(1);
  });

  it('the same run with another note is a conflict that shows what stands', async () => {
    const reply = await publish('statistician', 1, { note: 'Another story.' });
    expect(reply.status).toBe(409);
    expect(reply.json.current).toMatchObject({ number: 1, note: NOTE });
  });

  it('carries the digest of its audit row', async () => {
    const [entry] = await rows<{ digest: string; record_id: string }>(
      `select digest, record_id from audit_entry where study_id = ? and action = 'publications:publish'`,
      [scene.studyId],
    );
    const [stored] = await rows<{ id: string }>(`select id from publication where study_id = ?`, [scene.studyId]);
    expect((await read('sponsor', 1)).json.auditDigest).toBe(entry!.digest);
    expect(entry!.record_id).toBe(stored!.id);
  });

  it('runs published at once get numbers in a row, and the later supersedes the earlier', async () => {
    const both = await Promise.all([publish('statistician', 2), publish('statistician', 4)]);
    expect(both.map((reply) => reply.json.number).sort()).toEqual([2, 3]);
    expect((await read('sponsor', 1)).json.supersededBy.number).toBe(2);
    expect((await read('sponsor', 2)).json.supersededBy.number).toBe(3);
    expect((await read('sponsor', 3)).json.supersededBy).toBeNull();
  });

  it('the database refuses to change or remove a publication, even to its owner', async () => {
    for (const sql of [
      `update publication set note = 'changed' where study_id = '${scene.studyId}'`,
      `delete from publication where study_id = '${scene.studyId}'`,
    ]) {
      await expect(rows(sql)).rejects.toThrow(/permission denied/);
      const database = new URL(process.env.DATABASE_URL!).pathname.slice(1);
      await expect(asAdmin(sql, database)).rejects.toThrow(/kept as they were written/);
    }
    expect((await read('sponsor', 1)).json.note).toBe(NOTE);
  });
});

describe('what readers get', () => {
  it('history newest first, paged, without the weight of the densities', async () => {
    const first = await list('manager', { size: 2 });
    expect(first.json).toMatchObject({ page: 1, size: 2, total: 3 });
    expect(first.json.items.map((item: { number: number }) => item.number)).toEqual([3, 2]);
    expect((await list('manager', { size: 2, page: 2 })).json.items).toHaveLength(1);
    expect(first.json.items[0].milestones[0]).not.toHaveProperty('density');
    expect((await list('manager', { size: 51 })).status).toBe(422);
  });

  it('nothing of a site, a subject or the fit, to any role', async () => {
    for (const as of ['statistician', 'manager', 'sponsor'] as const) {
      const { text } = await read(as, 1);
      for (const word of FORBIDDEN) expect(text).not.toContain(word);
      expect(text).toContain('One site is overdue to open.');
    }
  });

  it('a coordinator, a foreigner and a stranger get nothing; a number that is not there is 404', async () => {
    const statuses = await Promise.all(
      (['coordinator', 'owner', 'foreigner', 'stranger'] as const).map(async (as) => (await read(as, 1)).status),
    );
    expect(statuses).toEqual([403, 403, 404, 401]);
    expect((await read('sponsor', 77)).status).toBe(404);
  });

  it('only the statistician publishes, only the sponsor acknowledges', async () => {
    for (const as of ['manager', 'coordinator', 'sponsor', 'owner'] as const)
      expect((await publish(as, 4)).status).toBe(403);
    for (const as of ['manager', 'coordinator', 'statistician', 'owner'] as const)
      expect((await acknowledge(as, 1)).status).toBe(403);
  });

  it('counts the readers by role for the confirmation', async () => {
    const counts = await scene.act('statistician', 'publications:publish', (scope, { em }) => countReaders(scope, em));
    expect(counts).toEqual([
      { role: 'statistician', count: 1 },
      { role: 'manager', count: 1 },
      { role: 'sponsor', count: 1 },
    ]);
  });
});

describe('acknowledging', () => {
  it('is kept once, with its first instant, and the statistician sees who has', async () => {
    expect((await read('statistician', 3)).json.acknowledgements).toEqual([
      { name: scene.people.sponsor.name, acknowledgedAt: null },
    ]);
    const twice = await Promise.all([acknowledge('sponsor', 3), acknowledge('sponsor', 3)]);
    expect(twice.map((reply) => reply.status)).toEqual([200, 200]);
    expect(twice[0]!.json).toEqual(twice[1]!.json);
    const at = twice[0]!.json.acknowledgedAt;
    expect((await acknowledge('sponsor', 3)).json.acknowledgedAt).toBe(at);
    expect((await read('sponsor', 3)).json).toMatchObject({ acknowledgedAt: at, acknowledgements: null });
    expect((await read('statistician', 3)).json.acknowledgements).toEqual([
      { name: scene.people.sponsor.name, acknowledgedAt: at },
    ]);
    expect((await read('manager', 3)).json.acknowledgements).toBeNull();
    expect(
      await rows(`select 1 from audit_entry where study_id = ? and action = 'publications:acknowledge'`, [
        scene.studyId,
      ]),
    ).toHaveLength(1);
  });

  it('is of one publication only', async () => {
    expect((await read('sponsor', 2)).json.acknowledgedAt).toBeNull();
    expect((await acknowledge('sponsor', 77)).status).toBe(404);
  });
});
