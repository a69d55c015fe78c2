import { DAYS_PER_MONTH } from './calendar';
import { createEnrolmentSimulator } from './enrolment-simulate';
import { createEventCounter } from './event-counter';
import { createEventsSimulator } from './events-simulate';
import type { ChunkResult, PreparedForecast } from './forecast';
import { createGenerator } from './generator';
import { type DrawHistory, fillMilestoneMoments } from './milestone-moments';

/** Runs `draws` draws on the random streams of one chunk. Memory is taken once per chunk, none per draw. */
export function simulateDraws(prepared: PreparedForecast, chunkIndex: number, draws: number): ChunkResult {
  const { schedule, events, milestones, monthEnds, cutoff, horizon } = prepared;
  const months = monthEnds.length;
  const generator = createGenerator(prepared.seed);
  const enrolment = createEnrolmentSimulator(prepared.enrolment, schedule, generator);
  const eventsSimulator = events
    ? createEventsSimulator(events, generator, { newSubjects: schedule.remaining, horizon })
    : null;
  const counter = events
    ? createEventCounter(events.observedEvents, {
        earliest: earliestEvent(prepared),
        latest: horizon,
        most: events.atRisk.elapsed.length + schedule.remaining,
      })
    : null;
  const milestoneMoments = new Float64Array(milestones.list.length * draws);
  const randomisedAtMonthEnds = new Int32Array(months * draws);
  const eventsAtMonthEnds = new Int32Array(events ? months * draws : 0);
  const history: DrawHistory = { arrivals: enrolment.arrivals, arrivalCount: 0, events: counter };
  const moments = new Float64Array(milestones.list.length);
  const limits = { cutoff, horizon };

  for (let draw = 0; draw < draws; draw += 1) {
    history.arrivalCount = enrolment.run(chunkIndex, draw);
    if (eventsSimulator && counter) {
      counter.load(
        eventsSimulator.moments,
        eventsSimulator.run(chunkIndex, draw, enrolment.arrivals, history.arrivalCount),
      );
    }
    fillMilestoneMoments(milestones, history, limits, moments);
    for (let place = 0; place < moments.length; place += 1) {
      milestoneMoments[place * draws + draw] = moments[place] as number;
    }
    let arrived = 0;
    for (let month = 0; month < months; month += 1) {
      const end = monthEnds[month] as number;
      while (arrived < history.arrivalCount && (enrolment.arrivals[arrived] as number) <= end) arrived += 1;
      randomisedAtMonthEnds[month * draws + draw] = milestones.randomised + arrived;
      if (counter) eventsAtMonthEnds[month * draws + draw] = counter.countAt(end);
    }
  }
  return { chunkIndex, draws, milestoneMoments, randomisedAtMonthEnds, eventsAtMonthEnds };
}

/** No simulated event comes before this: the first unlogged patient, or the end of a last known event-free day. */
function earliestEvent({ schedule, events }: PreparedForecast): number {
  let earliest = schedule.start;
  const { randomised, elapsed } = events?.atRisk ?? { randomised: [], elapsed: [] };
  for (let subject = 0; subject < elapsed.length; subject += 1) {
    earliest = Math.min(earliest, (randomised[subject] as number) + (elapsed[subject] as number) * DAYS_PER_MONTH);
  }
  return earliest;
}
