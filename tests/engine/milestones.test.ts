import { describe, expect, it } from 'vitest';
import { prepareForecast, runForecast, simulateChunk } from '@/lib/engine/forecast';
import { fillMilestoneMoments } from '@/lib/engine/milestone-moments';
import { site, smallStudy, subject, withEvents } from './small-study';

const options = { studySha256: '' };

describe('milestones in the data', () => {
  const study = smallStudy((draft) => {
    draft.enrolment.target = 3;
    draft.enrolment.sites = [site('101', { activatedOn: '2026-10-01', randomised: 3 })];
    withEvents(
      draft,
      [
        subject('1', { randomisedOn: '2026-10-05', status: 'event', statusOn: '2027-01-10' }),
        subject('2', { randomisedOn: '2026-11-05', status: 'event', statusOn: '2027-02-01' }),
        subject('3', { randomisedOn: '2026-12-05', status: 'withdrawn', statusOn: '2027-02-10' }),
      ],
      [
        { code: 'R2', kind: 'randomised', count: 2, plannedOn: '2026-11-01' },
        { code: 'E2', kind: 'events', count: 2, plannedOn: '2027-02-01' },
        { code: 'F2', kind: 'follow-up', months: 2 },
        { code: 'ALL', kind: 'all-of', of: ['INNER', 'F2'] },
        { code: 'INNER', kind: 'all-of', of: ['R2', 'E2'] },
        { code: 'E3', kind: 'events', count: 3 },
      ],
    );
  });
  const forecast = runForecast(study, options);
  const of = (code: string) => forecast.milestones.find((milestone) => milestone.code === code);

  it('have the day on which they were reached, as every quantile too', () => {
    expect(of('R2')?.reachedOn).toBe('2026-11-05');
    expect(of('E2')?.reachedOn).toBe('2027-02-01');
    // Start of 5 December plus 60.875 days.
    expect(of('F2')?.reachedOn).toBe('2027-02-03');
    expect(of('INNER')?.reachedOn).toBe('2027-02-01');
    expect(of('ALL')?.reachedOn).toBe('2027-02-03');
    expect(new Set(Object.values(of('E2')?.quantiles ?? {}))).toEqual(new Set(['2027-02-01']));
    expect(of('E2')?.density).toEqual([{ from: '2027-02-01', share: 1 }]);
    expect(of('E2')?.monteCarloErrorDays).toBe(0);
  });

  it('compare with the planned date', () => {
    expect(of('R2')?.probabilityByPlanned).toBe(0);
    expect(of('E2')?.probabilityByPlanned).toBe(1);
    expect(of('F2')?.probabilityByPlanned).toBeNull();
  });

  it('everything observed and nobody at risk: a milestone that nobody can reach is never reached', () => {
    expect(of('E3')?.probabilityReached).toBe(0);
    expect(of('E3')?.quantiles['0.5']).toBeNull();
    expect(of('E3')?.monteCarloErrorDays).toBeNull();
    expect(of('E3')?.density).toEqual([]);
    expect(forecast.cautions.map(({ code }) => code)).toContain('out-of-reach');
    // 120 months of 30.4375 days end half a day before 31 March.
    expect(forecast.monthly.at(-1)?.monthEnd).toBe('2037-02-28');
    expect(forecast.monthly.at(-1)?.events?.mean).toBe(2);
  });
});

describe('the day of a randomised count without subjects', () => {
  const reachedOn = (monthly?: { month: string; randomised: number }[]): string | null | undefined =>
    runForecast(
      smallStudy((draft) => {
        draft.enrolment.sites = [
          site('101', { activatedOn: '2026-10-01', randomised: 12, ...(monthly ? { monthly } : {}) }),
        ];
        draft.milestones = [{ code: 'R5', kind: 'randomised', count: 5 }];
      }),
      options,
    ).milestones[0]?.reachedOn;

  it('is the end of the month in which the monthly counts reach it, else the cut-off', () => {
    expect(
      reachedOn([
        { month: '2026-12', randomised: 8 },
        { month: '2026-11', randomised: 4 },
      ]),
    ).toBe('2026-12-31');
    expect(reachedOn()).toBe('2027-03-31');
  });
});

describe('milestones to come', () => {
  it('without the target there is no last patient, so no follow-up either', () => {
    const forecast = runForecast(
      smallStudy((draft) => {
        draft.enrolment.sites = [site('101', { activatedOn: '2026-10-01', randomised: 12, cap: 15 })];
        draft.milestones.push({ code: 'FU', kind: 'follow-up', months: 1 });
      }),
      options,
    );
    expect(forecast.milestones.map(({ probabilityReached }) => probabilityReached)).toEqual([0, 0]);
  });

  it('beyond the horizon counts as never', () => {
    const forecast = runForecast(
      smallStudy((draft) => {
        draft.simulation.horizonMonths = 40;
        draft.milestones.push({ code: 'FU', kind: 'follow-up', months: 12 });
      }),
      options,
    );
    const [last, followUp] = forecast.milestones;
    // 88 more at about 2 a month: about 44 months.
    expect(last?.probabilityReached).toBeGreaterThan(0.05);
    expect(last?.probabilityReached).toBeLessThan(0.5);
    expect(last?.quantiles['0.975']).toBeNull();
    expect(followUp?.probabilityReached).toBeLessThan(0.01);
    expect(forecast.monthly.at(-1)?.monthEnd).toBe('2030-06-30');
    expect(forecast.cautions.filter(({ code }) => code === 'not-reached').map(({ milestones }) => milestones)).toEqual([
      ['LPI'],
      ['FU'],
    ]);
  });

  it('nobody can enrol: no site active or planned', () => {
    const forecast = runForecast(
      smallStudy((draft) => {
        draft.enrolment.sites = [site('101', { activatedOn: '2026-10-01', closedOn: '2027-03-01', randomised: 12 })];
      }),
      options,
    );
    expect(forecast.milestones[0]?.probabilityReached).toBe(0);
    expect(forecast.monthly.at(-1)?.randomised.mean).toBe(12);
  });

  it('no site has opened yet: nothing to fit, a forecast all the same', () => {
    const forecast = runForecast(
      smallStudy((draft) => {
        draft.enrolment.sites = [
          site('101', { planned: { earliest: '2027-05-01', likely: '2027-06-01', latest: '2027-07-01' } }),
        ];
      }),
      options,
    );
    expect(forecast.fit).toEqual({ enrolment: null, events: null, dropout: null });
    expect(forecast.observed).toEqual({ randomised: 0, events: null, withdrawn: null, atRisk: null });
    expect(forecast.milestones[0]?.probabilityReached).toBe(1);
    expect(forecast.monthly[0]).not.toHaveProperty('events');
  });

  it('patients of unlogged months stand among the observed ones: the k-th is found in both', () => {
    const study = smallStudy((draft) => {
      draft.enrolment.target = 6;
      draft.enrolment.sites = [site('101', { activatedOn: '2026-10-01', randomised: 3, unlogged: ['2026-11'] })];
      withEvents(
        draft,
        [
          subject('1', { randomisedOn: '2026-10-05' }),
          subject('2', { randomisedOn: '2027-03-30' }),
          subject('3', { randomisedOn: '2027-03-31' }),
        ],
        [
          { code: 'R4', kind: 'randomised', count: 4 },
          { code: 'R6', kind: 'randomised', count: 6 },
          { code: 'FU', kind: 'follow-up', months: 12 },
        ],
      );
    });
    const prepared = prepareForecast(study);
    const out = new Float64Array(3);
    const fill = (arrivals: number[]): number[] => {
      fillMilestoneMoments(
        prepared.milestones,
        { arrivals: Float64Array.from(arrivals), arrivalCount: arrivals.length, events: null },
        { cutoff: prepared.cutoff, horizon: prepared.horizon },
        out,
      );
      return Array.from(out);
    };
    // Three in November: the 4th of all is the last of them, or the patient of 30 March, not the one of 31 March.
    expect(fill([-140, -130, -125])).toEqual([-125, 0, 365.25 - 1]);
    expect(fill([-140, -130, 20])).toEqual([-1, 20, 385.25]);
    expect(fill([-140, 10, 20])).toEqual([0, 20, 385.25]);
    expect(fill([10, 20])).toEqual([10, Infinity, Infinity]);
  });
});

describe('events', () => {
  it('an event-free day before the cut-off: an event after it may have happened already', () => {
    const study = smallStudy((draft) => {
      draft.enrolment.target = 200;
      draft.enrolment.sites = [site('101', { activatedOn: '2026-03-01', randomised: 200 })];
      withEvents(
        draft,
        Array.from({ length: 200 }, (_, place) =>
          subject(String(place), { randomisedOn: '2026-03-05', statusOn: '2027-01-31' }),
        ),
        [{ code: 'E1', kind: 'events', count: 1 }],
      );
    });
    const forecast = runForecast(study, options);
    expect((forecast.milestones[0]?.quantiles['0.5'] ?? '9') < '2027-03-31').toBe(true);
    expect((forecast.milestones[0]?.quantiles['0.025'] ?? '0') >= '2027-02-01').toBe(true);
    // By the end of April 89 days of the exponential have passed for each.
    const expected = 200 * -Math.expm1((-Math.LN2 / 12) * (89 / 30.4375));
    const april = forecast.monthly[0]?.events?.mean;
    expect(forecast.monthly).toEqual([]);
    expect(april).toBeUndefined();
    const chunk = simulateChunk(prepareForecast(study), 0);
    const counts = chunk.eventsAtMonthEnds.slice(0, chunk.draws);
    const average = counts.reduce((sum, count) => sum + count, 0) / chunk.draws;
    expect(Math.abs(average - expected)).toBeLessThan(4 * Math.sqrt(expected / chunk.draws));
  });

  it('a fixed follow-up ends the watch: no event later than randomisation + followUpMonths', () => {
    const study = smallStudy((draft) => {
      draft.enrolment.target = 100;
      draft.enrolment.sites = [site('101', { activatedOn: '2026-03-01', randomised: 100 })];
      withEvents(
        draft,
        Array.from({ length: 100 }, (_, place) => subject(String(place), { randomisedOn: '2027-01-01' })),
        [{ code: 'E90', kind: 'events', count: 90 }],
      );
      if (draft.events) draft.events.followUpMonths = 6;
    });
    const chunk = simulateChunk(prepareForecast(study), 0);
    const atEnd = chunk.eventsAtMonthEnds.slice(-chunk.draws);
    const average = atEnd.reduce((sum, count) => sum + count, 0) / chunk.draws;
    // From day 90 of follow-up to 6 months: P = 1 − exp(−h (6 − 90 / 30.4375)).
    const p = -Math.expm1((-Math.LN2 / 12) * (6 - 90 / 30.4375));
    expect(Math.abs(average - 100 * p)).toBeLessThan(4 * Math.sqrt((100 * p * (1 - p)) / chunk.draws));
    expect(chunk.milestoneMoments.every((moment) => moment === Infinity)).toBe(true);
  });

  it('dropout competes: of two constant hazards the event wins with its share', () => {
    const study = smallStudy((draft) => {
      draft.enrolment.target = 100;
      draft.enrolment.sites = [site('101', { activatedOn: '2026-03-01', randomised: 100 })];
      withEvents(
        draft,
        Array.from({ length: 100 }, (_, place) => subject(String(place))),
        [{ code: 'E99', kind: 'events', count: 99 }],
      );
      if (draft.events) draft.events.dropout = { perMonth: Math.LN2 / 12, basis: 'plan', priorEvents: 0 };
      draft.simulation.horizonMonths = 600;
    });
    const chunk = simulateChunk(prepareForecast(study), 0);
    const atEnd = chunk.eventsAtMonthEnds.slice(-chunk.draws);
    const average = atEnd.reduce((sum, count) => sum + count, 0) / chunk.draws;
    expect(Math.abs(average - 50)).toBeLessThan(4 * Math.sqrt(25 / chunk.draws));
  });

  it('aggregate data: the exponential’s events from those at risk, and a milestone reached is dated at the cut-off', () => {
    const forecast = runForecast(
      smallStudy((draft) => {
        draft.enrolment.target = 12;
        withEvents(
          draft,
          [],
          [
            { code: 'E3', kind: 'events', count: 3 },
            { code: 'E10', kind: 'events', count: 10 },
          ],
        );
        if (!draft.events) return;
        delete draft.events.subjects;
        draft.events.model.basis = 'data';
        draft.events.dropout = { perMonth: 0.01, basis: 'data', priorEvents: 5 };
        draft.events.aggregate = { events: 4, withdrawn: 1, atRisk: 7, personMonths: 50 };
      }),
      options,
    );
    expect(forecast.observed).toEqual({ randomised: 12, events: 4, withdrawn: 1, atRisk: 7 });
    expect(forecast.milestones[0]?.reachedOn).toBe('2027-03-31');
    expect(forecast.fit.events).toEqual([
      {
        family: 'exponential',
        weight: 1,
        ratePerMonth: 0.08,
        medianMonths: Math.LN2 / 0.08,
        logLikelihood: expect.closeTo(4 * Math.log(0.08) - 4, 12),
        aic: expect.closeTo(2 - 2 * (4 * Math.log(0.08) - 4), 12),
      },
    ]);
    expect(forecast.fit.dropout).toEqual({ perMonth: 0.02 });
    expect(forecast.milestones[1]?.probabilityReached).toBeGreaterThan(0.3);
    expect(forecast.milestones[1]?.probabilityReached).toBeLessThan(0.9);
  });

  it('no events yet, basis "data": the plan’s weight and the time without events', () => {
    for (const family of ['exponential', 'weibull'] as const) {
      const forecast = runForecast(
        smallStudy((draft) => {
          draft.enrolment.target = 40;
          draft.enrolment.sites = [site('101', { activatedOn: '2026-03-01', randomised: 40 })];
          withEvents(
            draft,
            Array.from({ length: 40 }, (_, place) => subject(String(place))),
            [{ code: 'E10', kind: 'events', count: 10 }],
            { family, basis: 'data', priorEvents: 4 },
          );
        }),
        options,
      );
      // 240 person-months without an event at a planned median of 12 months: later than the plan alone would say.
      expect((forecast.milestones[0]?.quantiles['0.5'] ?? '0') > '2027-08-01').toBe(true);
      expect(forecast.fit.events?.[0]?.ratePerMonth ?? 0).toBe(0);
      expect(forecast.cautions.map(({ code }) => code)).toEqual(
        expect.arrayContaining(['few-events', 'prior-outweighs-data']),
      );
    }
  });

  it('before the first patient: events from the plan alone, or from the plan’s own uncertainty', () => {
    const width = (family: 'exponential' | 'weibull', basis: 'plan' | 'data'): number => {
      const study = smallStudy((draft) => {
        draft.enrolment.sites = [site('101', { activatedOn: '2027-03-31' })];
        withEvents(draft, [], [{ code: 'E30', kind: 'events', count: 30 }], { family, basis });
      });
      const forecast = runForecast(study, options);
      expect(forecast.observed).toEqual({ randomised: 0, events: 0, withdrawn: 0, atRisk: 0 });
      expect(forecast.fit.events).toBeNull();
      const { quantiles } = forecast.milestones[0] ?? {};
      return Date.parse(quantiles?.['0.9'] ?? '') - Date.parse(quantiles?.['0.1'] ?? '');
    };
    for (const family of ['exponential', 'weibull'] as const) {
      expect(width(family, 'plan')).toBeGreaterThan(0);
      expect(width(family, 'data')).toBeGreaterThan(1.2 * width(family, 'plan'));
    }
  });
});
