import { DAYS_PER_MONTH, monthEnd, toDayNumber, toMonthOrdinal } from './calendar';
import type { EventsModel } from './events-model';
import type { Milestone, Study } from './types';

/** A milestone with what the data already say of it. Days are day numbers, moments days after the end of the cut-off day. */
export interface PreparedMilestone {
  milestone: Milestone;
  /** Day on which it was reached in the data; null: still to come. */
  reachedDay: number | null;
  plannedDay: number | null;
  /** Places of its parts, kind "all-of" only. */
  parts: number[];
}

export interface PreparedMilestones {
  list: PreparedMilestone[];
  /** Order in which a draw fills them in: parts before what is made of them. */
  order: Int32Array;
  randomised: number;
  target: number;
  /** Starts of the days of the observed randomisations, ascending; empty where only counts are known. */
  observedRandomisations: Float64Array;
  /** Start of the day of the last observed randomisation, as far as it is known; -Infinity: nobody yet. */
  lastObserved: number;
}

export function prepareMilestones(study: Study, events: EventsModel | null): PreparedMilestones {
  const cutoff = toDayNumber(study.dataCutoff);
  const randomised = study.enrolment.sites.reduce((sum, site) => sum + (site.randomised ?? 0), 0);
  const days = randomisationDays(study);
  const dayOfRandomisation = (count: number): number =>
    days ? (days[count - 1] as number) : dayByMonths(study, count);
  const places = new Map(study.milestones.map(({ code }, place) => [code, place]));
  const list: PreparedMilestone[] = study.milestones.map((milestone) => ({
    milestone,
    reachedDay: null,
    plannedDay: milestone.plannedOn ? toDayNumber(milestone.plannedOn) : null,
    parts: milestone.kind === 'all-of' ? milestone.of.map((code) => places.get(code) as number) : [],
  }));
  const order = partsFirst(list);
  const lastObserved = randomised > 0 ? dayOfRandomisation(randomised) - cutoff - 1 : -Infinity;
  for (const place of order) {
    const prepared = list[place] as PreparedMilestone;
    const { milestone } = prepared;
    if (milestone.kind === 'randomised') {
      if (randomised >= milestone.count) prepared.reachedDay = dayOfRandomisation(milestone.count);
    } else if (milestone.kind === 'events') {
      const moment = events?.observedEvents[milestone.count - 1];
      if (moment !== undefined) prepared.reachedDay = cutoff + moment;
    } else if (milestone.kind === 'follow-up') {
      const moment = lastObserved + milestone.months * DAYS_PER_MONTH;
      if (randomised >= study.enrolment.target && moment <= 0) prepared.reachedDay = cutoff + Math.ceil(moment);
    } else {
      const reached = prepared.parts.map((part) => list[part]?.reachedDay ?? Infinity);
      const last = Math.max(...reached);
      if (last < Infinity) prepared.reachedDay = last;
    }
  }
  return {
    list,
    order: Int32Array.from(order),
    randomised,
    target: study.enrolment.target,
    observedRandomisations: Float64Array.from(days ?? [], (day) => day - cutoff - 1),
    lastObserved,
  };
}

function randomisationDays(study: Study): Float64Array | null {
  const subjects = study.events?.subjects;
  if (!subjects) return null;
  return Float64Array.from(subjects, ({ randomisedOn }) => toDayNumber(randomisedOn)).sort();
}

/** Last day of the month in which the sites' monthly counts reach a number, else the cut-off; never after the cut-off. */
function dayByMonths(study: Study, count: number): number {
  const cutoff = toDayNumber(study.dataCutoff);
  const perMonth = new Map<number, number>();
  for (const site of study.enrolment.sites) {
    for (const { month, randomised } of site.monthly ?? []) {
      const ordinal = toMonthOrdinal(month);
      perMonth.set(ordinal, (perMonth.get(ordinal) ?? 0) + randomised);
    }
  }
  let sum = 0;
  for (const [ordinal, randomised] of [...perMonth].sort(([a], [b]) => a - b)) {
    sum += randomised;
    if (sum >= count) return Math.min(cutoff, monthEnd(ordinal));
  }
  return cutoff;
}

function partsFirst(list: readonly PreparedMilestone[]): number[] {
  const order: number[] = [];
  const visited = new Set<number>();
  const visit = (place: number): void => {
    if (visited.has(place)) return;
    visited.add(place);
    for (const part of list[place]?.parts ?? []) visit(part);
    order.push(place);
  };
  list.forEach((_, place) => visit(place));
  return order;
}
