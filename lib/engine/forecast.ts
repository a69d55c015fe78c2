/**
 * The forecast: prepare once, simulate in chunks of draws, summarise. The answer depends on the study, the seed and the number
 * of draws and on nothing else: chunk c uses the random streams of c, so any number of threads gives the same bytes.
 */
import { DAYS_PER_MONTH, monthEnd, monthOrdinal, toDayNumber } from './calendar';
import { type EnrolmentModel, prepareEnrolment } from './enrolment-model';
import { type EnrolmentSchedule, scheduleEnrolment } from './enrolment-schedule';
import { type EventsModel, prepareEvents } from './events-model';
import { type PreparedMilestones, prepareMilestones } from './milestones';
import { simulateDraws } from './simulate';
import { startTally, summariseTally, tallyChunk } from './summarise';
import { unsupportedParts } from './supported';
import type { Forecast, Study } from './types';

export { serialiseForecast } from './serialise';

/** Draws per chunk: the unit of work of a thread, and of the random streams. */
export const CHUNK_DRAWS = 250;

/** A study made ready for simulation: fits, posterior grids, schedules. Deterministic; each thread makes its own. */
export interface PreparedForecast {
  study: Study;
  draws: number;
  seed: number;
  /** Day number of the cut-off. */
  cutoff: number;
  /** Days after the end of the cut-off day beyond which nothing is simulated. */
  horizon: number;
  /** Ends of calendar months within the horizon, as moments (whole days after the end of the cut-off day). */
  monthEnds: Int32Array;
  enrolment: EnrolmentModel;
  schedule: EnrolmentSchedule;
  events: EventsModel | null;
  milestones: PreparedMilestones;
}

/** What the draws of one chunk gave: plain typed arrays, ready to be cloned or transferred between threads. */
export interface ChunkResult {
  chunkIndex: number;
  draws: number;
  /** Moments, milestone by milestone: place m · draws + d; Infinity: not within the horizon. */
  milestoneMoments: Float64Array<ArrayBuffer>;
  /** Randomised so far, observed ones included, month by month: place month · draws + d. */
  randomisedAtMonthEnds: Int32Array<ArrayBuffer>;
  /** Events so far, observed ones included, in the same layout; empty without an events part. */
  eventsAtMonthEnds: Int32Array<ArrayBuffer>;
}

/**
 * Fits the model and lays out the simulation.
 *
 * @param study a checked study file whose `unsupportedParts` are none
 * @throws RangeError where a part is not supported or a posterior is not proper
 */
export function prepareForecast(study: Study): PreparedForecast {
  const [refused] = unsupportedParts(study);
  // The study file's parser says this with a pointer; here it only keeps a part from being left out in silence.
  if (refused) throw new RangeError(`${refused.pointer}: ${refused.detail}`);
  const cutoff = toDayNumber(study.dataCutoff);
  const horizon = study.simulation.horizonMonths * DAYS_PER_MONTH;
  const enrolment = prepareEnrolment(study);
  const events = prepareEvents(study);
  return {
    study,
    draws: study.simulation.draws,
    seed: study.simulation.seed,
    cutoff,
    horizon,
    monthEnds: monthEndsWithin(cutoff, horizon),
    enrolment,
    schedule: scheduleEnrolment(study, enrolment, horizon),
    events,
    milestones: prepareMilestones(study, events),
  };
}

function monthEndsWithin(cutoff: number, horizon: number): Int32Array {
  const ends: number[] = [];
  for (let month = monthOrdinal(cutoff + 1); monthEnd(month) - cutoff <= horizon; month += 1) {
    ends.push(monthEnd(month) - cutoff);
  }
  return Int32Array.from(ends);
}

/** Number of chunks that a number of draws is cut into; the last may be short. */
export function chunkCount(draws: number): number {
  return Math.ceil(draws / CHUNK_DRAWS);
}

/**
 * Runs the draws of one chunk.
 *
 * @param chunkIndex from 0 to `chunkCount(draws) - 1`
 * @throws RangeError for another index
 */
export function simulateChunk(prepared: PreparedForecast, chunkIndex: number): ChunkResult {
  const draws = Math.min(CHUNK_DRAWS, prepared.draws - chunkIndex * CHUNK_DRAWS);
  if (!Number.isInteger(chunkIndex) || chunkIndex < 0 || draws <= 0) {
    throw new RangeError(`There is no chunk ${chunkIndex} in ${prepared.draws} draws.`);
  }
  return simulateDraws(prepared, chunkIndex, draws);
}

/** The buffers of a chunk, for the transfer list of `postMessage`. */
export function transferables(chunk: ChunkResult): ArrayBuffer[] {
  return [chunk.milestoneMoments.buffer, chunk.randomisedAtMonthEnds.buffer, chunk.eventsAtMonthEnds.buffer];
}

/**
 * The forecast of some chunks, in any order; with all of them, the forecast of the study.
 *
 * @param options.studySha256 SHA-256 of the study file's bytes, hexadecimal
 * @throws RangeError without any chunk
 */
export function summariseForecast(
  prepared: PreparedForecast,
  chunks: Iterable<ChunkResult>,
  options: { studySha256: string },
): Forecast {
  const tally = startTally(prepared);
  for (const chunk of chunks) tallyChunk(tally, chunk);
  return summariseTally(prepared, tally, options);
}

/** Thrown by `runForecast` where `cancelled` said so. */
export class ForecastCancelled extends Error {
  override name = 'ForecastCancelled';
}

/**
 * Prepares, simulates chunk after chunk in this thread, and summarises.
 *
 * @param options.onProgress called after each chunk with the number of draws done
 * @param options.cancelled asked before each chunk
 * @throws ForecastCancelled where `cancelled` returns true
 */
export function runForecast(
  study: Study,
  options: { studySha256: string; onProgress?: (drawsDone: number) => void; cancelled?: () => boolean },
): Forecast {
  const prepared = prepareForecast(study);
  const tally = startTally(prepared);
  for (let chunk = 0; chunk < chunkCount(prepared.draws); chunk += 1) {
    if (options.cancelled?.()) throw new ForecastCancelled('The forecast was cancelled.');
    tallyChunk(tally, simulateChunk(prepared, chunk));
    options.onProgress?.(tally.draws);
  }
  return summariseTally(prepared, tally, options);
}
