import { describe, expect, it } from 'vitest';
import type { Subject } from '@/lib/engine/types';
import { buildStudyFile, countReporting, type CutData, eventSourceOf, serialiseStudyFile } from '@/lib/forecasts/rules';
import type { SiteEnrolment } from '@/lib/site-log/queries';
import { parseStudyFile } from '@/lib/study-file/parse';
import { plan } from '@/tests/jobs/forecast-scene';

/** A site as the log knows it: opened in January 2026, with the months given. */
function logged(code: string, months: Record<string, number>, over: Partial<SiteEnrolment> = {}): SiteEnrolment {
  const monthly = Object.entries(months).map(([month, randomised]) => ({ month, randomised }));
  return {
    code,
    country: 'GB',
    activatedOn: '2026-01-10',
    closedOn: null,
    planned: null,
    cap: null,
    randomised: monthly.reduce((sum, row) => sum + row.randomised, 0),
    loggedThrough: '2026-04-30',
    unlogged: [],
    monthly,
    ...over,
  };
}

let counter = 0;
const listed = (site: string, ...days: string[]): Subject[] =>
  days.map((randomisedOn) => {
    counter += 1;
    return { id: `S${counter}`, site, randomisedOn, status: 'at-risk', statusOn: '2026-04-30' };
  });

const build = (sites: SiteEnrolment[], cut: CutData | null = null, cutoffOn = '2026-04-30') =>
  buildStudyFile({
    study: { code: 'KLD-301', title: 'A study' },
    plan,
    sites,
    cut,
    cutoffOn,
    draws: null,
    seed: null,
  });
const fromListing = (sites: SiteEnrolment[], subjects: Subject[], cutoffOn?: string) =>
  build(sites, { kind: 'subjects', subjects }, cutoffOn).enrolment.sites;

const full = { '2026-01': 1, '2026-02': 0, '2026-03': 2, '2026-04': 1 };

describe('with a listing', () => {
  it('who was randomised comes from the listing, whatever the log has', () => {
    const [site] = fromListing([logged('101', full)], listed('101', '2026-01-12', '2026-03-02', '2026-03-20'));
    expect(site).toMatchObject({
      randomised: 3,
      loggedThrough: '2026-04-30',
      monthly: [
        { month: '2026-01', randomised: 1 },
        { month: '2026-03', randomised: 2 },
      ],
    });
    expect(site!.unlogged).toBeUndefined();
  });

  it('a month that is neither logged nor listed is not known to be empty', () => {
    const gaps = logged('101', { '2026-01': 1, '2026-03': 0 });
    expect(fromListing([gaps], listed('101', '2026-01-12'))[0]).toMatchObject({
      loggedThrough: '2026-03-31',
      unlogged: ['2026-02'],
    });
    expect(fromListing([gaps], listed('101', '2026-02-12', '2026-04-02'))[0]).toMatchObject({
      loggedThrough: '2026-04-30',
      randomised: 2,
    });
    const silent = logged('102', {}, { unlogged: ['2026-01', '2026-02', '2026-03', '2026-04'] });
    expect(fromListing([silent], listed('101'))[0]).toMatchObject({
      randomised: 0,
      loggedThrough: '2026-04-30',
      unlogged: ['2026-01', '2026-02', '2026-03', '2026-04'],
    });
  });

  it('speaks for the month that its cut-off cuts short, at sites that had reported up to it', () => {
    const cutoffOn = '2026-04-14';
    const to = (months: Record<string, number>) => logged('101', months, { loggedThrough: '2026-03-31' });
    const reported = fromListing([to({ '2026-01': 1, '2026-02': 0, '2026-03': 2 })], listed('101'), cutoffOn);
    expect(reported[0]).toMatchObject({ loggedThrough: cutoffOn });
    const behind = fromListing([to({ '2026-01': 1, '2026-02': 0 })], listed('101'), cutoffOn);
    expect(behind[0]).toMatchObject({ loggedThrough: '2026-02-28' });
    const fresh = fromListing([logged('101', {}, { activatedOn: '2026-04-02' })], listed('101'), cutoffOn);
    expect(fresh[0]).toMatchObject({ loggedThrough: cutoffOn, randomised: 0 });
  });

  it('the file is one that the contract takes', () => {
    const study = build(
      [
        logged('101', full),
        logged('102', { '2026-02': 0 }, { loggedThrough: '2026-02-28', unlogged: ['2026-01'] }),
        logged('103', {}, { activatedOn: null, planned: { earliest: '2026-05-01', likely: '2026-06-01', latest: '2026-07-01' } }),
        logged('104', {}, { activatedOn: null, closedOn: '2026-03-01' }),
      ],
      { kind: 'subjects', subjects: [...listed('101', '2026-01-12'), ...listed('102', '2026-04-02')] },
    ); // prettier-ignore
    const text = serialiseStudyFile(study);
    expect(parseStudyFile(text)).toMatchObject({ ok: true });
    expect(text.endsWith('}\n')).toBe(true);
    expect(study.enrolment.sites.map((site) => site.code)).toEqual(['101', '102', '103']);
    expect(countReporting(study)).toEqual({ open: 2, reported: 1 });
    expect(eventSourceOf(study)).toBe('subjects');
  });
});

describe('with totals', () => {
  it('who was randomised comes from the log', () => {
    const aggregate = { events: 1, withdrawn: 0, atRisk: 3, personMonths: 9.5 };
    const study = build([logged('101', full)], { kind: 'aggregate', aggregate });
    expect(study.enrolment.sites[0]).toMatchObject({ randomised: 4, monthly: logged('101', full).monthly });
    expect(study.events!.aggregate).toEqual(aggregate);
    expect(parseStudyFile(serialiseStudyFile(study))).toMatchObject({ ok: true });
  });
});

describe('without a cut', () => {
  it('events follow the plan while nobody is randomised', () => {
    const study = build([logged('101', { '2026-01': 0 })]);
    expect(study.events).toMatchObject({ model: { basis: 'plan' }, dropout: { basis: 'plan' } });
    expect(study.milestones).toEqual(plan.milestones);
    expect(eventSourceOf(study)).toBe('plan');
    expect(parseStudyFile(serialiseStudyFile(study))).toMatchObject({ ok: true });
  });

  it('and are left out with all that waits for them once somebody is', () => {
    const study = build([logged('101', full)]);
    expect(study.events).toBeUndefined();
    expect(study.milestones.map((one) => one.code)).toEqual(['LPI', 'FU6']);
    expect(eventSourceOf(study)).toBe('none');
    expect(parseStudyFile(serialiseStudyFile(study))).toMatchObject({ ok: true });
  });
});

it('draws and seed of the request come before the plan’s', () => {
  const parts = {
    study: { code: 'K', title: 'T' },
    plan,
    sites: [logged('101', full)],
    cut: null,
    cutoffOn: '2026-04-30',
  };
  expect(buildStudyFile({ ...parts, draws: 500, seed: 0 }).simulation).toEqual({
    draws: 500,
    seed: 0,
    horizonMonths: 60,
  });
  expect(buildStudyFile({ ...parts, draws: null, seed: null }).simulation).toEqual(plan.simulation);
});
