import { DAYS_PER_MONTH, toDayNumber } from './calendar';
import type { EventsPart, Subject } from './types';

/** Pooled follow-up of all randomised subjects: what a survival likelihood needs. Times are in one unit (months here). */
export interface SurvivalData {
  /** Distinct times in ascending order, all above 0. */
  times: Float64Array;
  /** Events at each time. */
  events: Float64Array;
  /** Subjects whose follow-up without event ends at each time. */
  censored: Float64Array;
  eventCount: number;
  /** Sum of all times, with or without event. */
  exposure: number;
  /** false: only totals are known, `times` is empty and only the exponential can be fitted. */
  hasTimes: boolean;
}

/** Time of a subject in days: the day of randomisation is day 1 (the ADaM convention). */
export function daysOnStudy(subject: Subject): number {
  return toDayNumber(subject.statusOn) - toDayNumber(subject.randomisedOn) + 1;
}

/**
 * Groups subjects with equal times.
 *
 * @param times each above 0
 * @param isEvent of each time, whether an event ended it
 */
export function groupTimes(times: readonly number[], isEvent: readonly boolean[]): SurvivalData {
  const groups = new Map<number, { events: number; censored: number }>();
  let exposure = 0;
  let eventCount = 0;
  times.forEach((time, place) => {
    const group = groups.get(time) ?? { events: 0, censored: 0 };
    if (isEvent[place]) {
      group.events += 1;
      eventCount += 1;
    } else {
      group.censored += 1;
    }
    groups.set(time, group);
    exposure += time;
  });
  const sorted = [...groups].sort(([a], [b]) => a - b);
  return {
    times: Float64Array.from(sorted, ([time]) => time),
    events: Float64Array.from(sorted, ([, { events }]) => events),
    censored: Float64Array.from(sorted, ([, { censored }]) => censored),
    eventCount,
    exposure,
    hasTimes: true,
  };
}

/** The events' data of a study, times in months: withdrawals and ends of follow-up censor events. */
export function eventData(events: EventsPart): SurvivalData {
  if (events.aggregate) return totals(events.aggregate.events, events.aggregate.personMonths);
  const subjects = events.subjects ?? [];
  return groupTimes(
    subjects.map((subject) => daysOnStudy(subject) / DAYS_PER_MONTH),
    subjects.map(({ status }) => status === 'event'),
  );
}

/** Follow-up of which only totals are known. */
export function totals(eventCount: number, exposure: number): SurvivalData {
  const none = new Float64Array(0);
  return { times: none, events: none, censored: none, eventCount, exposure, hasTimes: false };
}
