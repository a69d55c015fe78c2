import { beforeAll, describe, expect, it } from 'vitest';
import { GET as sentRoute } from '@/app/api/v1/studies/[code]/alerts/route';
import { DELETE as deleteRoute, PUT as changeRoute } from '@/app/api/v1/studies/[code]/alerts/rules/[id]/route';
import { GET as rulesRoute, POST as addRoute } from '@/app/api/v1/studies/[code]/alerts/rules/route';
import { POST as publishRoute } from '@/app/api/v1/studies/[code]/publications/route';
import { evaluateAfterLog } from '@/lib/alerts/commands';
import {
  addAlertRuleOperation,
  changeAlertRuleOperation,
  deleteAlertRuleOperation,
  listAlertRulesOperation,
  listSentAlertsOperation,
} from '@/lib/alerts/operations';
import type { AlertCondition } from '@/lib/alerts/schema';
import { addDays } from '@/lib/dates';
import { transact } from '@/lib/db/transaction';
import { publishForecast } from '@/lib/publications/commands';
import { publishForecastOperation } from '@/lib/publications/operations';
import { addPlan, addRun } from '@/tests/api/publications-scene';
import { fixtureMilestone, shifted } from '@/tests/domain/publications-fixture';
import { createScene, type PersonaName, type Scene } from '@/tests/support/scene';

let scene: Scene;
let planVersionId: string;
let runs = 0;

const slips: AlertCondition = { kind: 'slips', days: 14 };
const body = (change: object = {}) => ({
  milestoneCode: 'IA',
  condition: slips,
  recipients: { roles: ['sponsor'], personIds: [] },
  isActive: true,
  ...change,
});
const add = (as: PersonaName, change: object = {}) =>
  scene.call(addRoute, addAlertRuleOperation, { as, body: body(change) });
const change = (as: PersonaName, id: string, values: object) =>
  scene.call(changeRoute, changeAlertRuleOperation, { as, params: { id }, body: values });
const remove = (as: PersonaName, id: string, version: number) =>
  scene.call(deleteRoute, deleteAlertRuleOperation, { as, params: { id }, query: { version } });
const rules = async () => (await scene.call(rulesRoute, listAlertRulesOperation, { as: 'statistician' })).json;
const sent = async () => (await scene.call(sentRoute, listSentAlertsOperation, { as: 'statistician' })).json;
const rows = <T>(sql: string, values: unknown[] = []): Promise<T[]> =>
  transact({ organisationId: scene.organisationId }, (em) => em.execute<T[]>(sql, values));
const mails = () =>
  rows<{ recipient: string; subject: string }>(`select recipient, subject from mail_message order by created_at`);
const jobs = () => rows<{ data: unknown }>(`select data from pgboss.job where name = 'mail-deliver'`);

/** Publishes a run of its own whose dates lie so many days later than the fixture's. */
async function publish(days: number) {
  runs += 1;
  await addRun(scene, { planVersionId, number: runs, change: (one) => shifted(one, days) });
  return scene.call(publishRoute, publishForecastOperation, {
    as: 'statistician',
    body: { runNumber: runs, note: 'A note.', confirm: true },
  });
}

beforeAll(async () => {
  scene = await createScene();
  planVersionId = await addPlan(scene);
});

describe('rules', () => {
  it('are the statistician’s alone', async () => {
    for (const as of ['manager', 'sponsor', 'coordinator', 'owner'] as const) expect((await add(as)).status).toBe(403);
  });

  it('know the plan’s milestones and the study’s readers, and refuse others with a pointer', async () => {
    const stranger = scene.people.coordinator.personId;
    const reply = await add('statistician', {
      milestoneCode: 'ZZ',
      recipients: { roles: [], personIds: [scene.people.manager.personId, stranger] },
    });
    expect(reply.status).toBe(422);
    expect(reply.json.errors.map((fault: { pointer: string }) => fault.pointer)).toEqual([
      '/milestoneCode',
      '/recipients/personIds/1',
    ]);
    const known = await rules();
    expect(known.milestones.map((one: { code: string }) => one.code)).toEqual(['LPI', 'IA', 'FA', 'FU', 'PA']);
    expect(known.readers.map((one: { role: string }) => one.role).sort()).toEqual([
      'manager',
      'sponsor',
      'statistician',
    ]);
  });

  it('are added, changed, switched off and deleted, each with its trace; a stale version shows what stands', async () => {
    const made = await add('statistician');
    expect(made.status).toBe(201);
    const { id, version } = made.json;
    const changed = await change('statistician', id, body({ condition: { kind: 'slips', days: 7 }, version }));
    expect(changed.json).toMatchObject({ condition: { days: 7 }, version: version + 1 });
    const stale = await change('statistician', id, body({ isActive: false, version }));
    expect(stale.status).toBe(409);
    expect(stale.json.current).toMatchObject({ condition: { days: 7 }, isActive: true });
    const off = await change(
      'statistician',
      id,
      body({ condition: { kind: 'slips', days: 7 }, isActive: false, version: version + 1 }),
    );
    expect(off.json.isActive).toBe(false);
    expect((await remove('statistician', id, version)).status).toBe(409);
    expect((await remove('statistician', id, version + 2)).status).toBe(200);
    expect((await remove('statistician', id, version + 2)).status).toBe(404);
    expect(
      (
        await rows<{ action: string }>(
          `select action from audit_entry where record_type = 'alert_rule' order by sequence`,
        )
      ).map((row) => row.action),
    ).toEqual(['alerts:add-rule', 'alerts:change-rule', 'alerts:change-rule', 'alerts:delete-rule']);
  });

  it('of two changes at once one wins and the other is shown it', async () => {
    const { id, version } = (await add('statistician')).json;
    const both = await Promise.all(
      [3, 4].map((days) => change('statistician', id, body({ condition: { kind: 'slips', days }, version }))),
    );
    expect(both.map((reply) => reply.status).sort()).toEqual([200, 409]);
    await remove('statistician', id, version + 1);
  });
});

describe('a publication', () => {
  it('sets off what slipped, once a person, in its own transaction, and says so in the list', async () => {
    const made = await add('statistician', {
      recipients: { roles: ['sponsor', 'manager'], personIds: [scene.people.sponsor.personId] },
    });
    await add('statistician', { milestoneCode: 'FA', isActive: false });
    expect((await publish(0)).status).toBe(201);
    expect(await mails()).toEqual([]);
    expect((await publish(16)).status).toBe(201);
    const told = await mails();
    expect(told.map(({ recipient }) => recipient).sort()).toEqual(
      [scene.people.manager.email, scene.people.sponsor.email].sort(),
    );
    expect(told[0]!.subject).toMatch(new RegExp(`^${scene.studyCode}: interim analysis now .*, 16 days later$`));
    expect(await jobs()).toHaveLength(2);
    const page = await sent();
    expect(page.total).toBe(1);
    expect(page.items[0]).toMatchObject({ publicationNumber: 2 });
    expect(page.items[0].mails.map((mail: { state: string }) => mail.state)).toEqual(['queued', 'queued']);
    const refused = await remove('statistician', made.json.id, made.json.version);
    expect([refused.status, refused.json.detail]).toEqual([
      409,
      'This rule has told people something, so it is kept. Switch it off instead.',
    ]);
  });

  it('that wavers by a day says nothing', async () => {
    const before = (await mails()).length;
    await publish(17);
    await publish(16);
    expect(await mails()).toHaveLength(before);
  });

  it('that is rolled back tells nobody: no publication, no alert, no message, no job', async () => {
    runs += 1;
    await addRun(scene, { planVersionId, number: runs, change: (one) => shifted(one, 90) });
    const count = async () => [
      (await rows(`select 1 from publication`)).length,
      (await rows(`select 1 from alert`)).length,
      (await mails()).length,
      (await jobs()).length,
    ];
    const before = await count();
    const input = { body: { runNumber: runs, note: 'Never mind.', confirm: true as const } };
    const abandoned = scene.act('statistician', 'publications:publish', async (scope, context) => {
      await publishForecast(scope, input, context);
      expect((await context.em.execute(`select 1 from mail_message`)).length).toBe(before[2]! + 2);
      throw new Error('the line dropped');
    });
    await expect(abandoned).rejects.toThrow('the line dropped');
    expect(await count()).toEqual(before);
  });

  it('tells nobody who has left the study', async () => {
    const before = (await mails()).length;
    await rows(`delete from study_member where person_id = ?`, [scene.people.manager.personId]);
    await publish(60);
    const told = (await mails()).slice(before);
    expect(told.map(({ recipient }) => recipient)).toEqual([scene.people.sponsor.email]);
  });
});

describe('a saved month', () => {
  const median = addDays(fixtureMilestone('LPI').quantiles['0.5']!, 60);
  const log = (at: string) =>
    scene.act('coordinator', 'site-log:log', (scope, context) => evaluateAfterLog(context, scope), `${at}T10:00:00Z`);

  it('makes rules about nearness look again at the publication that stands, and they speak once', async () => {
    await add('statistician', { milestoneCode: 'LPI', condition: { kind: 'nears', withinWeeks: 4, probability: 0.5 } });
    await add('statistician', { milestoneCode: 'LPI', condition: { kind: 'slips', days: 1 } });
    const before = (await mails()).length;
    await log(addDays(median, -60));
    expect(await mails()).toHaveLength(before);
    await Promise.all([log(addDays(median, -20)), log(addDays(median, -20))]);
    await log(addDays(median, -10));
    const told = (await mails()).slice(before);
    expect(told).toHaveLength(1);
    expect(told[0]!.subject).toContain('last patient in nears');
    const [entry] = await rows<{ actor_id: string | null }>(
      `select actor_id from audit_entry where action = 'alerts:raise' order by sequence desc limit 1`,
    );
    expect(entry!.actor_id).toBeNull();
  });
});
