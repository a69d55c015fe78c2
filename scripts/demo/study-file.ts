import { generateTrial, subjectsAsOf } from '@/scripts/demo/generate';
import type { Study } from '@/lib/engine/types';

/** The demonstration's large study as a study file, without a database: for measuring. */
export function demoStudyFile(): Study {
  const dataCutoff = '2026-10-31';
  const trial = generateTrial({
    seed: 301,
    lastMonth: '2026-11',
    monthsIn: 14,
    meanPerMonth: 1.5,
    medianMonths: 22,
    lossPerMonth: 0.004,
  });
  const subjects = subjectsAsOf(trial, dataCutoff);
  return {
    format: 'kalends-study/1',
    study: { code: 'KLD-301', title: 'Velmorat against placebo in adults with chronic kidney disease' },
    dataCutoff,
    enrolment: {
      target: 1200,
      rate: { meanPerMonth: 1.6, cv: 0.8, basis: 'data' },
      sites: trial.sites.map((site) => {
        const facts = { code: site.code, country: site.country, cap: site.cap };
        if (site.activatedOn && site.activatedOn <= dataCutoff) {
          const randomised = subjects.filter((subject) => subject.site === site.code).length;
          return { ...facts, activatedOn: site.activatedOn, randomised };
        }
        const [earliest, likely, latest] = site.replanned ?? site.planned;
        return { ...facts, planned: { earliest, likely, latest } };
      }),
    },
    events: {
      model: { family: 'weibull', medianMonths: 22, shape: 1, basis: 'data', priorEvents: 10 },
      dropout: { perMonth: 0.004, basis: 'data', priorEvents: 5 },
      subjects,
    },
    milestones: [
      { code: 'LPI', name: 'Last patient in', kind: 'randomised', count: 1200 },
      { code: 'IA', name: 'Interim analysis', kind: 'events', count: 288 },
      { code: 'FA', name: 'Final analysis', kind: 'events', count: 480 },
    ],
    simulation: { draws: 10_000, seed: 1, horizonMonths: 120 },
  };
}
