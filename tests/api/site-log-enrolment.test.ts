import { beforeAll, describe, expect, it } from 'vitest';
import { PUT as logRoute } from '@/app/api/v1/studies/[code]/log/[site]/[month]/route';
import { logMonthOperation } from '@/lib/site-log/operations';
import { listLog, loggedEnrolment, studyTotalsByMonth } from '@/lib/site-log/queries';
import { createScene, type Scene } from '@/tests/support/scene';

const zeros = { screened: 0, failed: 0, randomised: 0, events: 0, withdrawn: 0 };
let scene: Scene;

describe('what the log knows for a forecast', () => {
  const as = <T>(work: Parameters<typeof scene.act<'site-log:read', T>>[2], at?: string) =>
    scene.act('statistician', 'site-log:read', work, at);
  const put = (month: string, cells: object) =>
    scene.call(logRoute, logMonthOperation, {
      as: 'coordinator',
      params: { site: '101', month },
      body: { version: null, cells },
    });
  beforeAll(async () => {
    scene = await createScene();
    await put('2026-02', { ...zeros, screened: 9, randomised: 1 });
    await put('2026-04', { ...zeros, randomised: 3, events: 1 });
    await put('2026-05', { screened: 1 });
    await put('2026-06', { ...zeros, randomised: 2 });
  });

  it('months up to the cut-off’s last whole month, gaps named, a figure not reported being a gap', async () => {
    const [site, silent] = await as((scope, { em }) => loggedEnrolment(em, scope, '2026-06-30'));
    expect(site).toEqual({
      code: '101',
      country: 'GB',
      activatedOn: '2026-02-10',
      closedOn: null,
      planned: null,
      cap: 40,
      randomised: 6,
      loggedThrough: '2026-06-30',
      unlogged: ['2026-03', '2026-05'],
      monthly: [
        { month: '2026-02', randomised: 1 },
        { month: '2026-04', randomised: 3 },
        { month: '2026-06', randomised: 2 },
      ],
    });
    expect(silent).toMatchObject({
      code: '102',
      randomised: 0,
      loggedThrough: '2026-06-30',
      unlogged: ['2026-02', '2026-03', '2026-04', '2026-05', '2026-06'],
      monthly: [],
    });
  });

  it('nothing after the cut-off, and a site that opened later still to open', async () => {
    const [middle] = await as((scope, { em }) => loggedEnrolment(em, scope, '2026-06-29'));
    expect(middle).toMatchObject({ randomised: 4, loggedThrough: '2026-04-30', unlogged: ['2026-03'] });
    const [early] = await as((scope, { em }) => loggedEnrolment(em, scope, '2026-01-31'));
    expect(early).toMatchObject({
      activatedOn: null,
      planned: { earliest: '2026-02-10', likely: '2026-02-10', latest: '2026-02-10' },
      randomised: 0,
      monthly: [],
      unlogged: [],
    });
  });

  it('totals of the study by month-end', async () => {
    expect(await as((scope, { em }) => studyTotalsByMonth(em, scope, '2026-05-31'))).toEqual([
      { monthEnd: '2026-02-28', randomised: 1, events: 0 },
      { monthEnd: '2026-03-31', randomised: 1, events: 0 },
      { monthEnd: '2026-04-30', randomised: 4, events: 1 },
      { monthEnd: '2026-05-31', randomised: 4, events: 1 },
    ]);
  });

  it('the overview tells reported, incomplete and missing apart', async () => {
    const overview = await as(
      (scope, context) => listLog(scope, { query: { page: 1, size: 50, months: 6 } }, context),
      '2026-07-03T10:00:00Z',
    );
    expect(overview.months).toEqual(['2026-01', '2026-02', '2026-03', '2026-04', '2026-05', '2026-06']);
    expect(overview.items[0]).toMatchObject({
      states: ['closed', 'reported', 'missing', 'reported', 'incomplete', 'reported'],
      missing: 1,
      incomplete: 1,
      randomised: 6,
    });
  });
});
