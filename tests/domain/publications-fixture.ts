import { createHash } from 'node:crypto';
import { addDays } from '@/lib/dates';
import type { Forecast, MilestoneForecast, Study } from '@/lib/engine/types';
import type { PublishedForecast } from '@/lib/publications/schema';
import { fixtureForecast } from '@/tests/components/figure-fixture';

/** Words and figures of a site, a subject or an engine's inside: none of them may come through to a reader. */
export const FORBIDDEN = ['SITE-777', 'Lindenhof', 'subject-0042', 'logLikelihood', '"fit"', 'withdrawn', 'atRisk'];

const shift = (date: string | null, days: number): string | null => date && addDays(date, days);

/** The same milestone, every date of it so many days later. */
export function shifted(milestone: MilestoneForecast, days: number): MilestoneForecast {
  return {
    ...milestone,
    quantiles: Object.fromEntries(
      Object.entries(milestone.quantiles).map(([level, date]) => [level, shift(date, days)]),
    ) as MilestoneForecast['quantiles'],
    density: milestone.density.map(({ from, share }) => ({ from: addDays(from, days), share })),
  };
}

export function reached(milestone: MilestoneForecast, on: string): MilestoneForecast {
  return {
    ...milestone,
    reachedOn: on,
    probabilityReached: 1,
    density: [],
    quantiles: Object.fromEntries(
      Object.keys(milestone.quantiles).map((level) => [level, on]),
    ) as MilestoneForecast['quantiles'],
  };
}

const base = fixtureForecast({ draws: 500 });

export function fixtureMilestone(code: string): MilestoneForecast {
  return base.milestones.find((milestone) => milestone.code === code)!;
}

export function fixtureStudyFile(code: string): Study {
  return {
    format: 'kalends-study/1',
    study: { code, title: 'Ostrelin in adults with gout' },
    dataCutoff: base.cutoff,
    enrolment: {
      target: 1200,
      rate: { meanPerMonth: 0.55, cv: 0.8, basis: 'data' },
      sites: [
        {
          code: 'SITE-777',
          country: 'GB',
          activatedOn: '2026-02-10',
          randomised: 3,
          monthly: [
            { month: '2027-01', randomised: 1 },
            { month: '2027-03', randomised: 2 },
          ],
        },
      ],
    },
    events: {
      model: { family: 'weibull', medianMonths: 20, basis: 'data', priorEvents: 5 },
      dropout: { perMonth: 0.02, basis: 'data', priorEvents: 5 },
      subjects: [
        { id: 'subject-0042', site: 'SITE-777', randomisedOn: '2027-01-11', status: 'event', statusOn: '2027-02-20' },
        { id: 'subject-0043', site: 'SITE-777', randomisedOn: '2027-03-02', status: 'at-risk', statusOn: '2027-03-31' },
        { id: 'subject-0044', site: 'SITE-777', randomisedOn: '2027-03-09', status: 'event', statusOn: '2027-03-30' },
      ],
    },
    milestones: base.milestones.map(({ code: own, name, kind, count, months, of, plannedOn }) => ({
      code: own,
      name,
      kind,
      count,
      months,
      of,
      plannedOn,
    })) as Study['milestones'],
    simulation: { draws: 500, seed: 11, horizonMonths: 60 },
  };
}

/** A forecast file around the figures of the charts' own fixture, with everything in it that has to stay inside. */
export function fixtureForecastFile(
  studyFile: Study,
  change: (milestone: MilestoneForecast) => MilestoneForecast = (one) => one,
): Forecast {
  return {
    format: 'kalends-forecast/1',
    engineVersion: '1.0.0',
    studySha256: createHash('sha256').update(JSON.stringify(studyFile)).digest('hex'),
    seed: 11,
    draws: 500,
    dataCutoff: base.cutoff,
    observed: { randomised: 3, events: 2, withdrawn: 0, atRisk: 1 },
    fit: {
      enrolment: { meanPerMonth: 0.5, shape: 1.2, logLikelihood: -31.4 },
      events: null,
      dropout: { perMonth: 0.02 },
    },
    milestones: base.milestones.map(change),
    monthly: base.monthly,
    cautions: [
      {
        code: 'overdue-sites',
        text: 'SITE-777 (Lindenhof) is overdue to open.',
        sponsorText: 'One site is overdue to open. The forecast opens it after the cut-off.',
        milestones: ['LPI'],
      },
      {
        code: 'few-events',
        text: 'SITE-777 (Lindenhof) has most of the events.',
        sponsorText: 'Only 2 events have been seen so far; the dates rest on the plan.',
      },
    ],
  };
}

export function fixtureContent(change?: (milestone: MilestoneForecast) => MilestoneForecast): PublishedForecast {
  const file = fixtureForecastFile(fixtureStudyFile('KLD-900'), change);
  return {
    study: { code: 'KLD-900', title: 'Ostrelin in adults with gout', sponsorName: 'Tarn Medicines' },
    dataCutoff: file.dataCutoff,
    runNumber: 8,
    observed: { randomised: 3, events: 2 },
    observedMonthly: [{ monthEnd: file.dataCutoff, randomised: 3, events: 2 }],
    milestones: file.milestones,
    monthly: file.monthly,
    cautions: file.cautions.map(({ code, sponsorText, milestones = [] }) => ({ code, text: sponsorText, milestones })),
    provenance: { engineVersion: '1.0.0', studySha256: file.studySha256, seed: 11, draws: 500 },
  };
}
