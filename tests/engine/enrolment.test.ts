import { describe, expect, it } from 'vitest';
import { DAYS_PER_MONTH } from '@/lib/engine/calendar';
import { siteCalendar, siteExposure } from '@/lib/engine/enrolment-exposure';
import { maximiseEnrolment } from '@/lib/engine/enrolment-likelihood';
import { prepareEnrolment } from '@/lib/engine/enrolment-model';
import { siteRates } from '@/lib/engine/enrolment-sites';
import { prepareForecast, runForecast, simulateChunk } from '@/lib/engine/forecast';
import type { Enrolment, Site, Study } from '@/lib/engine/types';
import { mean } from '@/tests/reference/closed-forms';
import { site, smallStudy } from './small-study';

const options = { studySha256: '' };

function exposureDays(change: Partial<Site>, enrolment: Pick<Enrolment, 'seasonality' | 'rampUp'> = {}): number {
  return siteExposure(siteCalendar(site('1', change), '2027-03-31'), enrolment) * DAYS_PER_MONTH;
}

describe('exposure', () => {
  it('counts both ends: active and logged from day a to day c is c − a + 1 days', () => {
    expect(exposureDays({ activatedOn: '2027-03-31' })).toBeCloseTo(1, 10);
    expect(exposureDays({ activatedOn: '2027-03-01' })).toBeCloseTo(31, 10);
    expect(exposureDays({ activatedOn: '2027-03-01', closedOn: '2027-03-10' })).toBeCloseTo(10, 10);
    expect(exposureDays({})).toBe(0);
  });

  it('a month that is not logged is no exposure, neither in between nor at the end', () => {
    expect(exposureDays({ activatedOn: '2027-01-01', unlogged: ['2027-02'] })).toBeCloseTo(31 + 31, 10);
    expect(exposureDays({ activatedOn: '2027-01-01', loggedThrough: '2027-01-31' })).toBeCloseTo(31, 10);
    expect(exposureDays({ activatedOn: '2027-02-15', unlogged: ['2027-02', '2027-02'] })).toBeCloseTo(31, 10);
    expect(exposureDays({ activatedOn: '2027-03-01', loggedThrough: '2027-02-28' })).toBe(0);
  });

  it('lists what has to be simulated before the cut-off', () => {
    const calendar = siteCalendar(
      site('1', { activatedOn: '2027-01-10', unlogged: ['2027-01'], loggedThrough: '2027-02-28' }),
      '2027-03-31',
    );
    const length = calendar.unlogged.map(({ from, to }) => to - from);
    expect(length).toEqual([22, 31]);
    expect(calendar.logged.map(({ from, to }) => to - from)).toEqual([28]);
  });

  it('weighs days by the season as given, not rescaled, and by the ramp-up from the activation on', () => {
    const seasonality = [1, 0.5, 0, 1, 1, 1, 1, 1, 1, 1, 1, 1];
    expect(exposureDays({ activatedOn: '2027-01-01' }, { seasonality })).toBeCloseTo(31 + 14, 10);
    const rampUp = { months: 2, fraction: 0.25 };
    expect(exposureDays({ activatedOn: '2027-03-01' }, { rampUp })).toBeCloseTo(31 / 4, 10);
    const slow = 2 * DAYS_PER_MONTH;
    expect(exposureDays({ activatedOn: '2027-01-01' }, { rampUp })).toBeCloseTo(slow / 4 + 90 - slow, 10);
    // 17 days of January, all slow; of March, the first 15.875 days.
    const march = slow - (17 + 28);
    expect(exposureDays({ activatedOn: '2027-01-15', unlogged: ['2027-02'] }, { rampUp })).toBeCloseTo(
      (17 + march) / 4 + (31 - march),
      10,
    );
  });
});

describe('fit', () => {
  const sites = (counts: number[], exposures: number[], ratios = counts.map(() => 1)) => ({
    counts: Float64Array.from(counts),
    exposures: Float64Array.from(exposures),
    ratios: Float64Array.from(ratios),
  });

  it('counts no more spread than Poisson’s have no shape, and the Poisson’s mean and likelihood', () => {
    const fit = maximiseEnrolment(sites([3, 3, 4], [1, 1, 1]));
    const logLikelihood = [3, 3, 4].reduce(
      (sum, n) => sum + n * Math.log(10 / 3) - 10 / 3 - Math.log(n === 3 ? 6 : 24),
      0,
    );
    expect(fit).toEqual({ meanPerMonth: 10 / 3, shape: null, logLikelihood: expect.closeTo(logLikelihood, 10) });
  });

  it('nobody yet: mean 0, no shape; no exposure yet: nothing to fit', () => {
    expect(maximiseEnrolment(sites([0, 0], [2, 3]))).toEqual({ meanPerMonth: 0, shape: null, logLikelihood: 0 });
    expect(maximiseEnrolment(sites([0], [0]))).toBeNull();
  });

  it('countries keep their planned ratio: exposure twice as productive counts twice', () => {
    const plain = maximiseEnrolment(sites([1, 9, 4, 20], [1, 2, 3, 4]));
    const scaled = maximiseEnrolment(sites([1, 9, 4, 20], [2, 1, 3, 2], [0.5, 2, 1, 2]));
    expect(scaled?.meanPerMonth).toBeCloseTo(plain?.meanPerMonth ?? 0, 7);
    expect(scaled?.shape).toBeCloseTo(plain?.shape ?? 0, 5);
  });
});

describe('posterior of a site', () => {
  it('basis "plan": exactly Gamma(alpha + n, beta + tau)', () => {
    const study = smallStudy((draft) => {
      draft.enrolment.rate = { meanPerMonth: 2, cv: 0.5, basis: 'plan' };
      draft.enrolment.sites.push(
        site('102', { planned: { earliest: '2027-05-01', likely: '2027-05-02', latest: '2027-05-03' } }),
      );
    });
    const [active, planned] = siteRates(study);
    expect(active?.shape).toBeCloseTo(4 + 12, 12);
    expect(active?.rate).toBeCloseTo(2 + 182 / DAYS_PER_MONTH, 12);
    expect(planned?.shape).toBe(4);
    expect(planned?.rate).toBe(2);
    expect(active?.interval80.low).toBeLessThan(active?.meanPerMonth ?? 0);
    expect(active?.interval80.high).toBeGreaterThan(active?.meanPerMonth ?? 0);
  });

  it('basis "data": shrunk between the site’s own record and the study, and wider than with known parameters', () => {
    const study = (basis: 'plan' | 'data'): Study =>
      smallStudy((draft) => {
        draft.enrolment.rate = { meanPerMonth: 1, cv: 0.8, basis };
        draft.enrolment.sites = [0, 2, 4, 6, 8, 10, 30].map((randomised, place) =>
          site(String(place), { activatedOn: '2026-10-01', randomised }),
        );
      });
    const best = siteRates(study('data'))[6];
    const none = siteRates(study('data'))[0];
    const own = 30 / (182 / DAYS_PER_MONTH);
    expect(best?.meanPerMonth).toBeLessThan(own);
    expect(best?.meanPerMonth).toBeGreaterThan(own / 2);
    expect(none?.meanPerMonth).toBeGreaterThan(0);
    expect(none?.meanPerMonth).toBeLessThan(0.6);
    expect(prepareEnrolment(study('plan')).grid).toBeNull();
  });
});

describe('simulated enrolment', () => {
  function arrivalsPerMonth(study: Study): { at: string; mean: number }[] {
    return runForecast(study, options).monthly.map(({ monthEnd, randomised }) => ({
      at: monthEnd,
      mean: randomised.mean,
    }));
  }

  /** Four standard errors of a Poisson mean among 2,000 draws. */
  const close = (expected: number): number => 4 * Math.sqrt(Math.max(expected, 1) / 2000);

  it('unlogged months are simulated, not taken as zero', () => {
    const study = smallStudy((draft) => {
      draft.enrolment.target = 1000;
      draft.enrolment.sites = [site('101', { activatedOn: '2027-01-01', randomised: 2, loggedThrough: '2027-01-31' })];
      draft.milestones = [{ code: 'M', kind: 'randomised', count: 1000 }];
    });
    const april = arrivalsPerMonth(study)[0];
    const expected = 2 + (2 * (28 + 31 + 30)) / DAYS_PER_MONTH;
    expect(april?.at).toBe('2027-04-30');
    expect(Math.abs((april?.mean ?? 0) - expected)).toBeLessThan(close(expected));
  });

  it('season and ramp-up lower the rate month by month', () => {
    const study = smallStudy((draft) => {
      draft.enrolment.target = 1000;
      draft.milestones = [{ code: 'M', kind: 'randomised', count: 1000 }];
      draft.enrolment.seasonality = [1, 1, 1, 1, 0, 0.5, 1, 1, 1, 1, 1, 1];
      draft.enrolment.rampUp = { months: 1, fraction: 0.5 };
      draft.enrolment.sites = [site('101', { activatedOn: '2027-03-31', randomised: 0 })];
    });
    const means = arrivalsPerMonth(study).map((row) => row.mean);
    const perDay = 2 / DAYS_PER_MONTH;
    // One day of the ramp-up lies before the cut-off.
    const slow = DAYS_PER_MONTH - 1;
    const april = perDay * (0.5 * slow + (30 - slow));
    expect(Math.abs((means[0] as number) - april)).toBeLessThan(close(april));
    expect(means[1]).toBe(means[0]);
    const june = april + perDay * 15;
    expect(Math.abs((means[2] as number) - june)).toBeLessThan(close(june));
  });

  it('a planned site opens inside its window and closes at the end of its last day', () => {
    const study = smallStudy((draft) => {
      draft.enrolment.target = 1000;
      draft.milestones = [{ code: 'M', kind: 'randomised', count: 1000 }];
      draft.enrolment.rate.meanPerMonth = 20;
      draft.enrolment.sites = [
        site('101', {
          planned: { earliest: '2027-05-01', likely: '2027-05-01', latest: '2027-05-01' },
          closedOn: '2027-06-15',
        }),
      ];
    });
    const means = arrivalsPerMonth(study).map((row) => row.mean);
    const perDay = 20 / DAYS_PER_MONTH;
    expect(means[0]).toBe(0);
    expect(Math.abs((means[1] as number) - 31 * perDay)).toBeLessThan(close(31 * perDay));
    expect(Math.abs((means[2] as number) - 46 * perDay)).toBeLessThan(close(46 * perDay));
    expect(means[5]).toBe(means[2]);
  });

  it('an overdue site opens 30 days after the cut-off on average', () => {
    const study = smallStudy((draft) => {
      draft.enrolment.target = 10_000;
      draft.milestones = [{ code: 'M', kind: 'randomised', count: 10_000 }];
      draft.enrolment.rate.meanPerMonth = 50;
      draft.simulation.horizonMonths = 24;
      draft.enrolment.sites = [
        site('101', { planned: { earliest: '2026-12-01', likely: '2027-01-01', latest: '2027-04-01' } }),
      ];
    });
    const last = arrivalsPerMonth(study).at(-1);
    expect(last?.at).toBe('2029-02-28');
    const expected = (50 / DAYS_PER_MONTH) * (700 - 30);
    expect(Math.abs((last?.mean ?? 0) - expected)).toBeLessThan(4 * Math.sqrt((expected + (49.3 * 1.0) ** 2) / 2000));
  });

  it('caps stop a site, the target stops everybody, closed and capped sites take nobody', () => {
    const capped = smallStudy((draft) => {
      draft.enrolment.sites = [
        site('101', { activatedOn: '2026-10-01', randomised: 12, cap: 20 }),
        site('102', { activatedOn: '2026-10-01', randomised: 5, cap: 5 }),
        site('103', { activatedOn: '2026-10-01', randomised: 3, closedOn: '2027-02-01' }),
      ];
    });
    const chunk = simulateChunk(prepareForecast(capped), 0);
    const atEnd = chunk.randomisedAtMonthEnds.slice(-chunk.draws);
    expect(new Set(atEnd)).toEqual(new Set([28]));
    const target = simulateChunk(prepareForecast(smallStudy()), 0);
    expect(new Set(target.randomisedAtMonthEnds.slice(-target.draws))).toEqual(new Set([100]));
  });

  it('the first patient whose date stands for the activation is not counted in the likelihood', () => {
    const withFlag = smallStudy((draft) => {
      draft.enrolment.sites = [
        site('101', { activatedOn: '2026-10-01', randomised: 12, activationIsFirstPatient: true }),
      ];
    });
    expect(prepareEnrolment(withFlag).sites.counts[0]).toBe(11);
    expect(prepareEnrolment(smallStudy()).sites.counts[0]).toBe(12);
    expect(runForecast(withFlag, options).observed.randomised).toBe(12);
  });

  it('basis "data" carries the uncertainty of mean and shape into a band that is wider than the plan’s', () => {
    const band = (basis: 'plan' | 'data'): number => {
      const study = smallStudy((draft) => {
        draft.enrolment.rate = { meanPerMonth: 2, cv: 0.4, basis };
        draft.enrolment.target = 400;
        draft.milestones = [{ code: 'M', kind: 'randomised', count: 400 }];
        draft.enrolment.sites = Array.from({ length: 30 }, (_, place) =>
          site(String(place), { planned: { earliest: '2027-04-10', likely: '2027-04-11', latest: '2027-04-12' } }),
        );
      });
      const chunk = simulateChunk(prepareForecast(study), 0);
      const sorted = chunk.milestoneMoments.sort();
      return (sorted[225] as number) - (sorted[25] as number);
    };
    expect(band('data')).toBeGreaterThan(3 * band('plan'));
    expect(mean([band('plan')])).toBeGreaterThan(10);
  });
});
