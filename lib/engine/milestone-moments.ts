import { DAYS_PER_MONTH } from './calendar';
import type { EventCounter } from './event-counter';
import type { PreparedMilestone, PreparedMilestones } from './milestones';

/** One draw's history, as the milestones see it. */
export interface DrawHistory {
  /** Moments of the simulated randomisations, ascending; the first `arrivalCount` places. */
  arrivals: Float64Array;
  arrivalCount: number;
  /** null: the study has no events. */
  events: EventCounter | null;
}

/**
 * Moments of all milestones in one draw; Infinity: not within the horizon.
 *
 * Randomised count: the k-th randomisation. Events: the k-th event. Follow-up: the last randomisation plus months; without the
 * target there is no last one. All-of: the latest of its parts.
 *
 * @param out one place per milestone, in the order of the study
 */
export function fillMilestoneMoments(
  milestones: PreparedMilestones,
  history: DrawHistory,
  limits: { cutoff: number; horizon: number },
  out: Float64Array,
): void {
  const { list, order } = milestones;
  for (let turn = 0; turn < order.length; turn += 1) {
    const place = order[turn] as number;
    const prepared = list[place] as PreparedMilestone;
    let moment: number;
    if (prepared.reachedDay !== null) {
      moment = prepared.reachedDay - limits.cutoff;
    } else if (prepared.milestone.kind === 'randomised') {
      moment = randomisationMoment(milestones, history, prepared.milestone.count);
    } else if (prepared.milestone.kind === 'events') {
      moment = history.events ? history.events.momentOf(prepared.milestone.count) : Infinity;
    } else if (prepared.milestone.kind === 'follow-up') {
      moment = lastRandomisation(milestones, history) + prepared.milestone.months * DAYS_PER_MONTH;
    } else {
      moment = -Infinity;
      for (const part of prepared.parts) moment = Math.max(moment, out[part] as number);
    }
    out[place] = moment > limits.horizon ? Infinity : moment;
  }
}

/**
 * The k-th randomisation among observed and simulated ones, k above the observed number. Where patients of months that are not
 * logged come before observed ones, the two sequences are merged; observed patients count at the END of their day, because a
 * moment at its start would be printed as the day before.
 */
function randomisationMoment(milestones: PreparedMilestones, history: DrawHistory, count: number): number {
  const { observedRandomisations: observed } = milestones;
  const { arrivals, arrivalCount } = history;
  let simulated = count - milestones.randomised;
  if (simulated > arrivalCount) return Infinity;
  let known = observed.length;
  while (
    known > 0 &&
    simulated < arrivalCount &&
    (observed[known - 1] as number) + 1 > (arrivals[simulated] as number)
  ) {
    known -= 1;
    simulated += 1;
  }
  const lastKnown = known > 0 ? (observed[known - 1] as number) + 1 : -Infinity;
  return Math.max(lastKnown, arrivals[simulated - 1] as number);
}

function lastRandomisation({ randomised, target, lastObserved }: PreparedMilestones, history: DrawHistory): number {
  const { arrivals, arrivalCount } = history;
  if (randomised + arrivalCount < target) return Infinity;
  return arrivalCount > 0 ? Math.max(lastObserved, arrivals[arrivalCount - 1] as number) : lastObserved;
}
