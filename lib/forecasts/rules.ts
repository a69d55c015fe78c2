import { addMonths, monthEnd, monthOf, monthsFrom } from '../dates';
import type { AggregateEvents, EventsPart, Milestone, Site, Study, Subject } from '../engine/types';
import type { SiteEnrolment } from '../site-log/queries';
import type { Plan } from '../studies/schema';
import type { EventSource } from './schema';

export type CutData = { kind: 'subjects'; subjects: Subject[] } | { kind: 'aggregate'; aggregate: AggregateEvents };

export interface StudyParts {
  study: { code: string; title: string };
  plan: Plan;
  /** Sites with what the log knows of them up to the cut-off. */
  sites: readonly SiteEnrolment[];
  cut: CutData | null;
  cutoffOn: string;
  draws: number | null;
  seed: number | null;
}

/**
 * The study file of a run. Where log and listing speak of the same thing, one rule decides:
 *
 * - With a listing, who was randomised comes from it alone (`randomised` and `monthly` of each site); what the log has
 *   otherwise was noted when the cut was accepted. The log still says which months a site has reported.
 * - With totals or without a cut, who was randomised comes from the log.
 * - Without a cut nothing is known of events. While nobody is randomised they follow the plan alone; once somebody is,
 *   the run forecasts enrolment only, and milestones that wait for events are left out.
 */
export function buildStudyFile(parts: StudyParts): Study {
  const { study, plan, cut, cutoffOn } = parts;
  const listed = cut?.kind === 'subjects' ? subjectsBySite(cut.subjects) : null;
  const sites = parts.sites
    .filter((site) => !neverOpens(site, cutoffOn))
    .map((site) =>
      toSite(listed && site.activatedOn ? fromListing(site, listed.get(site.code) ?? [], cutoffOn) : site),
    );
  const randomised = sites.reduce((sum, site) => sum + (site.randomised ?? 0), 0);
  const events = eventsPart(plan.events, cut, randomised);
  const { target, rate, ...rest } = plan.enrolment;
  return {
    format: 'kalends-study/1',
    study: { code: study.code, title: study.title },
    dataCutoff: cutoffOn,
    enrolment: { target, rate, ...rest, sites },
    ...(events && { events }),
    milestones: events ? plan.milestones : withoutEvents(plan.milestones),
    simulation: {
      draws: parts.draws ?? plan.simulation.draws,
      seed: parts.seed ?? plan.simulation.seed,
      horizonMonths: plan.simulation.horizonMonths,
    },
  };
}

/** Two spaces of indent and a newline at the end, like the forecast file. The SHA-256 of a run is of this text. */
export function serialiseStudyFile(study: Study): string {
  return `${JSON.stringify(study, null, 2)}\n`;
}

function subjectsBySite(subjects: readonly Subject[]): Map<string, Subject[]> {
  const bySite = new Map<string, Subject[]>();
  for (const subject of subjects) {
    const own = bySite.get(subject.site);
    if (own) own.push(subject);
    else bySite.set(subject.site, [subject]);
  }
  return bySite;
}

/** Closed before it ever opened. */
function neverOpens(site: SiteEnrolment, cutoffOn: string): boolean {
  return !site.activatedOn && site.closedOn !== null && site.closedOn <= cutoffOn;
}

function fromListing(site: SiteEnrolment, subjects: readonly Subject[], cutoffOn: string): SiteEnrolment {
  const counts = new Map<string, number>();
  for (const { randomisedOn } of subjects) {
    const month = monthOf(randomisedOn);
    counts.set(month, (counts.get(month) ?? 0) + 1);
  }
  const monthly = [...counts]
    .sort(([a], [b]) => (a < b ? -1 : 1))
    .map(([month, randomised]) => ({ month, randomised }));
  return { ...site, randomised: subjects.length, monthly, ...reporting(site, [...counts.keys()], cutoffOn) };
}

/**
 * A month is reported where the log has it or a subject of it is listed; any other is not known to be empty, gives no
 * exposure and is simulated. A month that the cut-off cuts short can't be in the log yet: for it the listing speaks, at
 * the sites that had reported up to it.
 */
function reporting(
  site: SiteEnrolment,
  listedMonths: readonly string[],
  cutoffOn: string,
): Pick<SiteEnrolment, 'loggedThrough' | 'unlogged'> {
  const opened = monthOf(site.activatedOn!);
  const reported = new Set([...site.monthly.map(({ month }) => month), ...listedMonths]);
  const cutMonth = monthOf(cutoffOn);
  const cutShort = cutoffOn < monthEnd(cutMonth);
  if (cutShort && (opened === cutMonth || reported.has(addMonths(cutMonth, -1)))) reported.add(cutMonth);
  const last = [...reported].sort().at(-1);
  const end = last === undefined ? cutoffOn : monthEnd(last);
  return {
    loggedThrough: end < cutoffOn ? end : cutoffOn,
    unlogged: monthsFrom(opened, last ?? cutMonth).filter((month) => !reported.has(month)),
  };
}

function toSite(site: SiteEnrolment): Site {
  const { code, country, activatedOn, planned, closedOn, cap, randomised, loggedThrough, unlogged, monthly } = site;
  const ends = { ...(closedOn !== null && { closedOn }), ...(cap !== null && { cap }) };
  if (!activatedOn) return { code, country, ...ends, ...(planned && { planned }) };
  return {
    code,
    country,
    activatedOn,
    ...ends,
    randomised,
    ...(loggedThrough !== null && { loggedThrough }),
    ...(unlogged.length > 0 && { unlogged }),
    monthly,
  };
}

function eventsPart(planned: Plan['events'], cut: CutData | null, randomised: number): EventsPart | null {
  if (!planned) return null;
  if (cut?.kind === 'subjects') return { ...planned, subjects: cut.subjects };
  if (cut?.kind === 'aggregate') return { ...planned, aggregate: cut.aggregate };
  if (randomised > 0) return null;
  return {
    ...planned,
    model: { ...planned.model, basis: 'plan' },
    dropout: { ...planned.dropout, basis: 'plan' },
  };
}

/** Milestones that wait for no event, not even by way of another milestone. */
function withoutEvents(milestones: readonly Milestone[]): Milestone[] {
  const left = new Set(milestones.filter((one) => one.kind === 'events').map((one) => one.code));
  for (let before = -1; before !== left.size;) {
    before = left.size;
    for (const one of milestones)
      if (one.kind === 'all-of' && one.of.some((part) => left.has(part))) left.add(one.code);
  }
  return milestones.filter((one) => !left.has(one.code));
}

export function eventSourceOf({ events }: Study): EventSource {
  if (!events) return 'none';
  if (events.subjects) return 'subjects';
  return events.aggregate ? 'aggregate' : 'plan';
}

/** Sites that were open, and those that had reported every month up to the cut-off or their closure. */
export function countReporting({ dataCutoff, enrolment }: Study): { open: number; reported: number } {
  const open = enrolment.sites.filter((site) => site.activatedOn);
  const reported = open.filter((site) => {
    const end = site.closedOn && site.closedOn < dataCutoff ? site.closedOn : dataCutoff;
    return (site.loggedThrough ?? dataCutoff) >= end && (site.unlogged ?? []).length === 0;
  });
  return { open: open.length, reported: reported.length };
}
