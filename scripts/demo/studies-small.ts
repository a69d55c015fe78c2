import { actAsOwner } from '@/scripts/demo/acting';
import { generateTrial } from '@/scripts/demo/generate';
import { giveRole, makePerson } from '@/scripts/demo/people';
import { PlanKeeper } from '@/scripts/demo/plans';
import { planRelease } from '@/scripts/demo/publishing';
import { enterSite, planLogActs, planSiteActs } from '@/scripts/demo/sites';
import type { DemoCast } from '@/scripts/demo/study-301';
import { Timeline } from '@/scripts/demo/timeline';
import { addDays, addMonths, monthEnd } from '@/lib/dates';
import { createStudy } from '@/lib/studies/commands';
import type { CreateStudyBody } from '@/lib/studies/schema';
import { Study } from '@/entities/study';

/** A study with its people, as its owner sets it up. */
export async function openStudy(cast: DemoCast, body: CreateStudyBody, at: string): Promise<string> {
  const { organisationId, owner, statistician, manager, sponsor } = cast;
  const studyId = await actAsOwner(owner, 'organisation:create-study', at, async (scope, context) => {
    await createStudy(scope, { body }, context);
    return (await context.em.findOneOrFail(Study, { organisationId, code: body.code })).id;
  });
  await giveRole(statistician, { organisationId, studyId, role: 'statistician' }, at);
  await giveRole(manager, { organisationId, studyId, role: 'manager' }, at);
  await giveRole(sponsor, { organisationId, studyId, role: 'sponsor' }, at);
  return studyId;
}

const SMALL = {
  code: 'KLD-102',
  title: 'Velmorat, dose finding in adults with chronic kidney disease',
  sponsorName: 'Orrin & Vale Therapeutics',
};
const NEW = {
  code: 'KLD-305',
  title: 'Velmorat in adults with diabetic kidney disease',
  sponsorName: 'Orrin & Vale Therapeutics',
};

/** The small study: eight sites, a target of patients and no events. */
export async function replaySmallStudy(cast: DemoCast, lastMonth: string, now: string): Promise<number> {
  const trial = generateTrial({
    seed: 102,
    lastMonth,
    monthsIn: 9,
    meanPerMonth: 1.3,
    medianMonths: 40,
    lossPerMonth: 0.002,
  });
  const sites = trial.sites.filter((site) => site.activatedOn && site.country === 'PL').slice(0, 8);
  const start = `${addDays(`${trial.months[0]}-01`, -30)}T08:00:00.000Z`;
  const studyId = await openStudy(cast, SMALL, start);
  const plannedOn = monthEnd(addMonths(lastMonth, 2));
  await new PlanKeeper(cast.statistician, SMALL.code).save(
    {
      enrolment: { target: 140, rate: { meanPerMonth: 1.4, cv: 0.7, basis: 'data' } },
      events: null,
      milestones: [{ code: 'LPI', name: 'Last patient in', kind: 'randomised', count: 140, plannedOn }],
      simulation: { draws: 10_000, seed: 1, horizonMonths: 60 },
    },
    start,
  );
  const timeline = new Timeline();
  for (const site of sites) {
    const entered = await enterSite(cast.manager, SMALL.code, site, start);
    const person = await makePerson(
      site.coordinator,
      `coordinator.102.${site.code}@sites.kalends.example`,
      null,
      start,
    );
    await giveRole(
      person,
      { organisationId: cast.organisationId, studyId, role: 'coordinator', siteId: entered.id },
      start,
    );
    planSiteActs(timeline, cast.manager, SMALL.code, site, entered, start.slice(0, 10));
    for (const entry of trial.log.filter((month) => month.site === site.code))
      planLogActs(timeline, person, SMALL.code, entry);
  }
  const month = addMonths(lastMonth, -1);
  planRelease(timeline, {
    cast,
    code: SMALL.code,
    month,
    trial: null,
    note: 'Eight sites, enrolling as planned. There is no events target.',
  });
  return timeline.play(now);
}

/** The study that has just been set up and holds nothing. */
export async function openEmptyStudy(cast: DemoCast, now: string): Promise<void> {
  await openStudy(cast, NEW, now);
}
