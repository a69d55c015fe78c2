import { writeFileSync } from 'node:fs';
import { runForecast } from '@/lib/engine/forecast';
import type { Study } from '@/lib/engine/types';
import { addDays, addMonths, monthEnd, monthsFrom } from '@/lib/dates';
import { generateTrial, subjectsAsOf } from '@/scripts/demo/generate';

/**
 * Writes the saved numbers of the first page's figure: the demonstration's generator (seed 77) as the trial, the engine
 * (seed 1, 10,000 draws) as the forecast. Run after a change of the engine: `npx tsx scripts/landing-example.ts`.
 */
const CUTOFF = '2027-01-31';
const trial = generateTrial({
  seed: 77,
  lastMonth: '2027-01',
  monthsIn: 14,
  meanPerMonth: 1.1,
  medianMonths: 21,
  lossPerMonth: 0.004,
});
const subjects = subjectsAsOf(trial, CUTOFF);
const openBy = (site: (typeof trial.sites)[number]): boolean => site.activatedOn !== null && site.activatedOn <= CUTOFF;

function studyOf(asPlanned: boolean): Study {
  return {
    format: 'kalends-study/1',
    study: { code: 'EXAMPLE', title: 'An invented trial' },
    dataCutoff: asPlanned ? addDays(`${trial.months[0]!}-01`, -1) : CUTOFF,
    enrolment: {
      target: 900,
      rate: { meanPerMonth: 1.3, cv: 0.8, basis: asPlanned ? 'plan' : 'data' },
      sites: trial.sites.map((site) => {
        const [earliest, likely, latest] = (!asPlanned && site.replanned) || site.planned;
        const facts = { code: site.code, country: site.country, cap: site.cap };
        if (asPlanned || !openBy(site)) return { ...facts, planned: { earliest, likely, latest } };
        const randomised = subjects.filter((subject) => subject.site === site.code).length;
        return { ...facts, activatedOn: site.activatedOn, randomised };
      }),
    },
    events: {
      model: {
        family: 'weibull',
        medianMonths: 20,
        shape: 1,
        basis: asPlanned ? 'plan' : 'data',
        priorEvents: 5,
      },
      dropout: { perMonth: 0.005, basis: asPlanned ? 'plan' : 'data', priorEvents: 5 },
      ...(asPlanned ? {} : { subjects }),
    },
    milestones: [
      { code: 'LPI', name: 'Last patient in', kind: 'randomised', count: 900, plannedOn: '2027-05-31' },
      { code: 'IA', name: 'Interim analysis', kind: 'events', count: 200, plannedOn: '2027-07-31' },
      { code: 'FA', name: 'Final analysis', kind: 'events', count: 320, plannedOn: '2028-01-31' },
    ],
    simulation: { draws: 10_000, seed: 1, horizonMonths: 60 },
  };
}

const { monthly, milestones } = runForecast(studyOf(false), { studySha256: '' });
const planned = runForecast(studyOf(true), { studySha256: '' }).monthly;
/** The planned line ends where it reaches its last count. */
const upTo = (most: number, points: { on: string; count: number }[]) =>
  points
    .filter((_, place) => (points[place - 1]?.count ?? 0) < most)
    .map(({ on, count }) => ({ on, count: Math.min(count, most) }));
const eventOn = (id: string): string | null => trial.subjects.find((subject) => subject.id === id)?.eventOn ?? null;
const days = monthsFrom(trial.months[0]!, '2027-01').flatMap((month) => {
  const last = monthEnd(month);
  return [`${month}-07`, `${month}-14`, `${month}-21`, last].filter((day) => day <= CUTOFF);
});
const example = {
  cutoff: CUTOFF,
  observed: [{ on: monthEnd(addMonths(trial.months[0]!, -1)), randomised: 0, events: 0 }].concat(
    days.map((on) => ({
      on,
      randomised: subjects.filter((subject) => subject.randomisedOn <= on).length,
      events: subjects.filter((subject) => (eventOn(subject.id) ?? '9') <= on).length,
    })),
  ),
  monthly,
  milestones,
  plan: {
    randomised: upTo(
      900,
      planned.map((row) => ({ on: row.monthEnd, count: row.randomised.quantiles['0.5'] })),
    ),
    events: upTo(
      320,
      planned.map((row) => ({ on: row.monthEnd, count: row.events?.quantiles['0.5'] ?? 0 })),
    ),
  },
};
writeFileSync('components/landing/example-trial.json', `${JSON.stringify(example)}\n`);
