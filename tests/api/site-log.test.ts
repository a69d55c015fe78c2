import { beforeAll, describe, expect, it } from 'vitest';
import { PATCH as correctRoute, PUT as logRoute } from '@/app/api/v1/studies/[code]/log/[site]/[month]/route';
import { GET as sheetRoute } from '@/app/api/v1/studies/[code]/log/[site]/route';
import { GET as overviewRoute } from '@/app/api/v1/studies/[code]/log/route';
import { transact } from '@/lib/db/transaction';
import {
  correctMonthOperation,
  getMonthSheetOperation,
  listLogOperation,
  logMonthOperation,
} from '@/lib/site-log/operations';
import { createScene, type PersonaName, type Scene } from '@/tests/support/scene';

let scene: Scene;
beforeAll(async () => {
  scene = await createScene();
});

const zeros = { screened: 0, failed: 0, randomised: 0, events: 0, withdrawn: 0 };

function log(
  month: string,
  cells: object,
  { as = 'coordinator' as PersonaName, site = '101', version = null as number | null, source = 'screen' } = {},
) {
  return scene.call(logRoute, logMonthOperation, { as, params: { site, month }, body: { version, source, cells } });
}
function correct(
  month: string,
  cells: object,
  { as = 'coordinator' as PersonaName, site = '101', reasonKind = 'typing-error', reason = 'Two keys at once' } = {},
) {
  return scene.call(correctRoute, correctMonthOperation, {
    as,
    params: { site, month },
    body: { cells, reasonKind, reason },
  });
}
const read = (as: PersonaName, site = '101') =>
  scene.call(sheetRoute, getMonthSheetOperation, { as, params: { site } });

interface Kept {
  audits: {
    action: string;
    changes: { field: string; old: unknown; new: unknown }[];
    reason: string | null;
    source: string;
    record_id: string;
  }[];
  revisions: { field: string; old_value: number | null; new_value: number | null; reason_kind: string | null }[];
}

/** What the trail and the revisions hold for a month of site 101. */
async function kept(month: string): Promise<Kept> {
  return transact({ organisationId: scene.organisationId }, async (em) => ({
    audits: await em.execute<Kept['audits']>(
      `select action, changes, reason, source, record_id from audit_entry where record_type = 'site_month' and record_id = ? order by sequence`,
      [`101 ${month}`],
    ),
    revisions: await em.execute<Kept['revisions']>(
      `select r.field, r.old_value, r.new_value, r.reason_kind from site_month_revision r join site_month m on m.id = r.site_month_id where m.site_id = ? and m.month = ?::date order by r.changed_at, r.field`,
      [scene.siteId, `${month}-01`],
    ),
  }));
}

describe('who may see and log a month', () => {
  const status: Record<PersonaName, [sheet: number, put: number, patch: number, overview: number]> = {
    coordinator: [200, 422, 422, 200],
    otherCoordinator: [404, 404, 404, 200],
    statistician: [200, 403, 403, 200],
    manager: [200, 403, 403, 200],
    owner: [403, 403, 403, 403],
    sponsor: [403, 403, 403, 403],
    foreigner: [404, 404, 404, 404],
    stranger: [401, 401, 401, 401],
  };
  it.each(Object.entries(status))('%s', async (as, expected) => {
    const role = as as PersonaName;
    const outcomes = [
      await read(role),
      // A month that can never be logged: those who may log get as far as the rule.
      await log('2026-01', { screened: 1 }, { as: role }),
      await correct('2026-01', { screened: { from: 1, to: 2 } }, { as: role }),
      await scene.call(overviewRoute, listLogOperation, { as: role }),
    ];
    expect(outcomes.map((reply) => reply.status)).toEqual(expected);
  });

  it('a coordinator’s overview holds their own site only', async () => {
    const own = await scene.call(overviewRoute, listLogOperation, { as: 'otherCoordinator' });
    expect(own.json.items.map((item: { code: string }) => item.code)).toEqual(['102']);
    const all = await scene.call(overviewRoute, listLogOperation, { as: 'manager' });
    expect(all.json.items.map((item: { code: string }) => item.code)).toEqual(['101', '102']);
  });

  it('a site that is not there and one of another coordinator answer alike', async () => {
    const [foreign, none] = [await read('coordinator', '102'), await read('coordinator', '999')];
    expect([foreign.status, none.status]).toEqual([404, 404]);
    expect(foreign.json.detail.replace('102', '999')).toBe(none.json.detail);
  });
});

describe('first figures', () => {
  it('are saved as far as they are known; empty is not nought', async () => {
    const saved = await log('2026-02', { screened: 5, failed: 1, randomised: 3, events: 0 }, { source: 'paste' });
    expect(saved.status).toBe(200);
    expect(saved.json).toMatchObject({
      month: '2026-02',
      state: 'incomplete',
      screened: 5,
      events: 0,
      withdrawn: null,
      version: 1,
    });
    const { audits, revisions } = await kept('2026-02');
    expect(audits).toHaveLength(1);
    expect(audits[0]).toMatchObject({ action: 'site-log:log', source: 'paste', reason: null });
    expect(audits[0]!.changes).toContainEqual({ field: 'randomised', old: null, new: 3 });
    expect(revisions).toHaveLength(4);
  });

  it('sent twice change nothing the second time', async () => {
    const again = await log('2026-02', { screened: 5, failed: 1, randomised: 3, events: 0 });
    expect([again.status, again.json.version]).toEqual([200, 1]);
    const counted = await kept('2026-02');
    expect([counted.audits.length, counted.revisions.length]).toEqual([1, 4]);
  });

  it('by two at the same instant are stored once', async () => {
    const both = await Promise.all([log('2026-03', zeros), log('2026-03', zeros), log('2026-03', zeros)]);
    expect(both.map((reply) => reply.status)).toEqual([200, 200, 200]);
    const counted = await kept('2026-03');
    expect([counted.audits.length, counted.revisions.length]).toEqual([1, 5]);
  });

  it('a figure that stands takes a correction', async () => {
    const again = await log('2026-02', { randomised: 2 }, { version: 1 });
    expect(again.status).toBe(422);
    expect(again.json.errors).toEqual([
      { pointer: '/cells/randomised', detail: 'Randomised is saved as 3. Correct it, with a reason.' },
    ]);
  });

  it('break no sum: every cell named, nothing stored', async () => {
    const refused = await log('2026-04', { screened: 0, failed: 9, randomised: 0, events: 9, withdrawn: 0 });
    expect(refused.status).toBe(422);
    expect(refused.json.errors.map((fault: { pointer: string }) => fault.pointer)).toEqual([
      '/cells/failed',
      '/cells/events',
    ]);
    expect((await kept('2026-04')).audits).toEqual([]);
    const over = await log('2026-04', { screened: 60, failed: 0, randomised: 50, events: 0, withdrawn: 0 });
    expect(over.json.errors).toEqual([{ pointer: '/cells/randomised', detail: expect.stringContaining('cap is 40') }]);
  });

  it('are whole, not negative, bounded, known by name, at least one', async () => {
    const wrong = await log('2026-04', {
      screened: 1.5,
      failed: -1,
      randomised: 10_001,
      events: '3',
      withdrawn: null,
      arm: 1,
    });
    expect(wrong.status).toBe(422);
    expect(wrong.json.errors.map((fault: { pointer: string }) => fault.pointer).sort()).toEqual(
      ['arm', 'events', 'failed', 'randomised', 'screened', 'withdrawn'].map((name) => `/cells/${name}`),
    );
    expect((await log('2026-04', {})).status).toBe(422);
    expect((await log('2026-4', { screened: 1 })).status).toBe(400);
  });

  it('belong to a month that is over, after the activation', async () => {
    const soon = new Date().toISOString().slice(0, 7);
    expect((await log(soon, zeros)).json.detail).toMatch(/is not over yet\. It can be logged from/);
    expect((await log('2026-01', zeros)).json.detail).toMatch(/^The site opened on 10 Feb 2026/);
  });
});

describe('two people in one month', () => {
  it('who fill different cells both win', async () => {
    const [one, two] = await Promise.all([
      log('2026-05', { screened: 4, failed: 1 }),
      log('2026-05', { events: 0, withdrawn: 0 }),
    ]);
    expect([one.status, two.status]).toEqual([200, 200]);
    const sheet = await read('coordinator');
    expect(sheet.json.months.find((entry: { month: string }) => entry.month === '2026-05')).toMatchObject({
      screened: 4,
      failed: 1,
      randomised: null,
      events: 0,
      withdrawn: 0,
      state: 'incomplete',
    });
  });

  it('who fill one cell: the second sees both values', async () => {
    await log('2026-06', { screened: 2 });
    const second = await log('2026-06', { screened: 3, failed: 0 });
    expect(second.status).toBe(409);
    expect(second.json.current).toMatchObject({ month: '2026-06', screened: 2, failed: null, version: 1 });
    expect((await kept('2026-06')).audits).toHaveLength(1);
  });

  it('fifty at once: one wins, the others see a conflict', async () => {
    const replies = await Promise.all(Array.from({ length: 50 }, (_, place) => log('2026-07', { screened: place })));
    const statuses = replies.map((reply) => reply.status);
    expect(statuses.filter((status) => status === 200)).toHaveLength(1);
    expect(statuses.filter((status) => status === 409)).toHaveLength(49);
    expect((await kept('2026-07')).revisions).toHaveLength(1);
  });
});

describe('corrections', () => {
  it('need a listed reason and words', async () => {
    const bare = await scene.call(correctRoute, correctMonthOperation, {
      as: 'coordinator',
      params: { site: '101', month: '2026-02' },
      body: { cells: { randomised: { from: 3, to: 2 } }, reasonKind: 'mood', reason: ' ' },
    });
    expect(bare.status).toBe(422);
    expect(bare.json.errors.map((fault: { pointer: string }) => fault.pointer)).toEqual(['/reasonKind', '/reason']);
  });

  it('keep the old figure, who, when and why, once however often they are sent', async () => {
    const change = { randomised: { from: 3, to: 2 } };
    const [first, second] = [await correct('2026-02', change), await correct('2026-02', change)];
    expect([first.status, second.status]).toEqual([200, 200]);
    expect(first.json.revisions).toEqual([
      expect.objectContaining({
        field: 'randomised',
        oldValue: 3,
        newValue: 2,
        reasonKind: 'typing-error',
        reason: 'Two keys at once',
        changedBy: scene.people.coordinator.name,
      }),
    ]);
    expect(second.json.version).toBe(first.json.version);
    const { audits, revisions } = await kept('2026-02');
    expect(audits.map((audit) => audit.action)).toEqual(['site-log:log', 'site-log:correct']);
    expect(audits[1]).toMatchObject({
      reason: 'typing-error: Two keys at once',
      changes: [{ field: 'randomised', old: 3, new: 2 }],
    });
    expect(revisions.at(-1)).toEqual({ field: 'randomised', old_value: 3, new_value: 2, reason_kind: 'typing-error' });
  });

  it('of a figure that someone else changed meanwhile show both values', async () => {
    const late = await correct('2026-02', { randomised: { from: 3, to: 1 } });
    expect(late.status).toBe(409);
    expect(late.json.current).toMatchObject({ randomised: 2 });
  });

  it('may say that a figure was not known, and obey the sums at later month-ends', async () => {
    const emptied = await correct('2026-05', { events: { from: 0, to: null } }, { reasonKind: 'other' });
    expect(emptied.json).toMatchObject({ events: null });
    const broken = await correct('2026-02', { screened: { from: 5, to: 0 } });
    expect(broken.status).toBe(422);
    expect(broken.json.errors[0].pointer).toBe('/cells/screened');
  });

  it('of a month without figures are not found', async () => {
    expect((await correct('2026-08', { screened: { from: 1, to: 2 } })).status).toBe(404);
  });
});
