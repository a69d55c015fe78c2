import { type DemoTrial, generateTrial } from '@/scripts/demo/generate';
import { planReading, planRelease, planRule } from '@/scripts/demo/publishing';
import { giveRole, makePerson, type DemoPerson } from '@/scripts/demo/people';
import { PlanKeeper } from '@/scripts/demo/plans';
import { openStudy } from '@/scripts/demo/studies-small';
import { enterSite, planLogActs, planSiteActs } from '@/scripts/demo/sites';
import { Timeline } from '@/scripts/demo/timeline';
import { addDays, addMonths, monthEnd } from '@/lib/dates';
import type { Plan } from '@/lib/studies/schema';

export interface DemoCast {
  organisationId: string;
  owner: DemoPerson;
  statistician: DemoPerson;
  manager: DemoPerson;
  coordinator: DemoPerson;
  sponsor: DemoPerson;
}

const CODE = 'KLD-301';
const MONTHS_IN = 14;
/** The site of the demonstration's coordinator. */
const OWN_SITE = '107';
/** Months, counted from the first, that a site did not report. */
const GAPS: Record<string, number[]> = { [OWN_SITE]: [9, 13], '305': [12], '402': [12], '605': [12] };

function planOf(lastMonth: string, lossPerMonth: number): Plan {
  const planned = (months: number): string => monthEnd(addMonths(lastMonth, months));
  return {
    enrolment: {
      target: 1200,
      rate: { meanPerMonth: 1.6, cv: 0.8, basis: 'data' },
      seasonality: [1, 1, 1, 1, 1, 1, 0.8, 0.75, 1, 1, 1, 0.8],
      rampUp: { months: 1, fraction: 0.5 },
    },
    events: {
      model: { family: 'weibull', medianMonths: 22, shape: 1, basis: 'data', priorEvents: 10 },
      dropout: { perMonth: lossPerMonth, basis: 'data', priorEvents: 5 },
      followUpMonths: null,
    },
    milestones: [
      { code: 'LPI', name: 'Last patient in', kind: 'randomised', count: 1200, plannedOn: planned(5) },
      { code: 'IA', name: 'Interim analysis', kind: 'events', count: 288, plannedOn: planned(7) },
      { code: 'FA', name: 'Final analysis', kind: 'events', count: 480, plannedOn: planned(16) },
      { code: 'FU12', name: '12 months after last patient in', kind: 'follow-up', months: 12, plannedOn: planned(17) },
      { code: 'PA', name: 'Primary analysis', kind: 'all-of', of: ['FA', 'FU12'], plannedOn: planned(18) },
    ],
    simulation: { draws: 10_000, seed: 1, horizonMonths: 120 },
  };
}

/** The large study, replayed act by act up to now. Answers with how many acts there were. */
export async function replayLargeStudy(cast: DemoCast, lastMonth: string, now: string): Promise<number> {
  const trial = generateTrial({
    seed: 301,
    lastMonth,
    monthsIn: MONTHS_IN,
    meanPerMonth: 1.5,
    medianMonths: 22,
    lossPerMonth: 0.004,
  });
  const start = `${addDays(`${trial.months[0]}-01`, -45)}T08:00:00.000Z`;
  const { organisationId, statistician, manager, coordinator } = cast;
  const body = {
    code: CODE,
    title: 'Velmorat against placebo in adults with chronic kidney disease',
    sponsorName: 'Orrin & Vale Therapeutics',
  };
  const studyId = await openStudy(cast, body, start);
  const plans = new PlanKeeper(statistician, CODE);
  await plans.save(planOf(lastMonth, 0.008), start);

  const timeline = new Timeline();
  for (const site of trial.sites) {
    const entered = await enterSite(manager, CODE, site, start);
    const own = site.code === OWN_SITE;
    const person = own
      ? coordinator
      : await makePerson(site.coordinator, `coordinator.${site.code}@sites.kalends.example`, null, start);
    await giveRole(person, { organisationId, studyId, role: 'coordinator', siteId: entered.id }, start);
    planSiteActs(timeline, manager, CODE, site, entered, `${trial.months[9]}-03`);
    for (const entry of trial.log.filter((month) => month.site === site.code)) {
      if (!GAPS[site.code]?.includes(trial.months.indexOf(entry.month))) planLogActs(timeline, person, CODE, entry);
    }
  }
  timeline.add(`${trial.months[9]}-20T10:00:00.000Z`, (at) =>
    plans.save(
      planOf(lastMonth, 0.004),
      at,
      'assumption',
      'Fewer patients are lost to follow-up than the protocol assumed.',
    ),
  );
  planReleases(timeline, cast, trial);
  return timeline.play(now);
}

/** The months whose data were published, counted from the first, with the statistician's words. */
const RELEASES: [month: number, note: string][] = [
  [6, 'First forecast, from seven months of data. The bands are wide: few events so far, and the plan still weighs.'],
  [8, 'Enrolment runs a little under plan; events come as the protocol assumed.'],
  [10, 'The sites of Portugal and Romania open later than planned, which moves the last patient. Events are on plan.'],
  [11, 'Loss to follow-up is lower than assumed, and the plan now says so. The analyses move little.'],
  [12, 'Another month of steady enrolment. The last three of the late sites are still to open.'],
];

function planReleases(timeline: Timeline, cast: DemoCast, trial: DemoTrial): void {
  const sponsor = { roles: ['sponsor' as const], personIds: [] };
  const rulesAt = `${trial.months[7]}-20T09:00:00.000Z`;
  planRule(timeline, cast, CODE, rulesAt, {
    milestoneCode: 'IA',
    condition: { kind: 'slips', days: 7 },
    recipients: sponsor,
  });
  planRule(timeline, cast, CODE, rulesAt, {
    milestoneCode: 'LPI',
    condition: { kind: 'nears', withinWeeks: 40, probability: 0.8 },
    recipients: { roles: ['sponsor', 'manager'], personIds: [] },
  });
  planRule(timeline, cast, CODE, rulesAt, { milestoneCode: 'IA', condition: { kind: 'reached' }, recipients: sponsor });
  RELEASES.forEach(([index, note], place) => {
    const month = trial.months[index]!;
    planRelease(timeline, { cast, code: CODE, month, trial, note });
    if (place < RELEASES.length - 1) planReading(timeline, cast, CODE, month, place + 1);
  });
}
