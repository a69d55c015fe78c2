import { dayOfMoment, mondayOf, monthOrdinal, toIsoDate } from './calendar';
import { raiseCautions } from './cautions';
import { fitForecast } from './fit';
import type { ChunkResult, PreparedForecast } from './forecast';
import type { PreparedMilestone } from './milestones';
import { type CountHistogram, countInto, medianError, quantileType1, quantileType7 } from './quantiles';
import {
  type CountForecast,
  type Forecast,
  type IsoDate,
  type MilestoneForecast,
  type MonthlyRow,
  QUANTILE_LEVELS,
  type QuantileLevel,
} from './types';

export const ENGINE_VERSION = '1.0.0';

/** Share of draws that decides where the monthly rows end. */
const MONTHLY_SHARE = 0.975;

/**
 * What has been counted so far. It grows with the draws only by the milestones' samples; the counts at month-ends are kept as
 * histograms.
 */
export interface Tally {
  draws: number;
  samples: Float64Array[];
  /** Per draw, the moment at which all milestones are reached. */
  allReached: Float64Array;
  randomised: (CountHistogram | undefined)[];
  events: (CountHistogram | undefined)[];
}

export function startTally(prepared: PreparedForecast): Tally {
  return {
    draws: 0,
    samples: prepared.milestones.list.map(() => new Float64Array(prepared.draws)),
    allReached: new Float64Array(prepared.draws),
    randomised: Array.from(prepared.monthEnds, () => undefined),
    events: prepared.events ? Array.from(prepared.monthEnds, () => undefined) : [],
  };
}

/**
 * Adds a chunk. Sums and histograms are of whole numbers and samples are sorted before use, so that the order of the chunks
 * leaves no trace.
 */
export function tallyChunk(tally: Tally, chunk: ChunkResult): void {
  const { draws } = chunk;
  tally.samples.forEach((sample, milestone) => {
    sample.set(chunk.milestoneMoments.subarray(milestone * draws, (milestone + 1) * draws), tally.draws);
  });
  for (let draw = 0; draw < draws; draw += 1) {
    let latest = -Infinity;
    for (const sample of tally.samples) latest = Math.max(latest, sample[tally.draws + draw] as number);
    tally.allReached[tally.draws + draw] = latest;
  }
  const ofMonth = (counts: Int32Array, month: number): Int32Array =>
    counts.subarray(month * draws, (month + 1) * draws);
  tally.randomised.forEach((histogram, month) => {
    tally.randomised[month] = countInto(histogram, ofMonth(chunk.randomisedAtMonthEnds, month));
  });
  tally.events.forEach((histogram, month) => {
    tally.events[month] = countInto(histogram, ofMonth(chunk.eventsAtMonthEnds, month));
  });
  tally.draws += draws;
}

/** The forecast of what has been counted. @throws RangeError where nothing has */
export function summariseTally(
  prepared: PreparedForecast,
  tally: Tally,
  { studySha256 }: { studySha256: string },
): Forecast {
  if (tally.draws === 0) throw new RangeError('A forecast needs at least one draw.');
  const { study, events } = prepared;
  const samples = tally.samples.map((sample) => sample.slice(0, tally.draws).sort());
  const milestones = prepared.milestones.list.map((milestone, place) =>
    milestoneForecast(milestone, samples[place] as Float64Array, prepared.cutoff),
  );
  const fit = fitForecast(prepared);
  return {
    format: 'kalends-forecast/1',
    engineVersion: ENGINE_VERSION,
    studySha256,
    seed: prepared.seed,
    draws: tally.draws,
    dataCutoff: study.dataCutoff,
    observed: {
      randomised: prepared.milestones.randomised,
      events: events?.observed.events ?? null,
      withdrawn: events?.observed.withdrawn ?? null,
      atRisk: events?.observed.atRisk ?? null,
    },
    fit,
    milestones,
    monthly: monthlyRows(prepared, tally),
    cautions: raiseCautions(prepared, samples, fit),
  };
}

function milestoneForecast(
  { milestone, reachedDay, plannedDay }: PreparedMilestone,
  sorted: Float64Array,
  cutoff: number,
): MilestoneForecast {
  const { code, name, kind, plannedOn } = milestone;
  const draws = sorted.length;
  const dateOf = (moment: number): IsoDate | null =>
    moment === Infinity ? null : toIsoDate(dayOfMoment(moment, cutoff));
  return {
    code,
    ...(name === undefined ? {} : { name }),
    kind,
    ...(milestone.kind === 'randomised' || milestone.kind === 'events' ? { count: milestone.count } : {}),
    ...(milestone.kind === 'follow-up' ? { months: milestone.months } : {}),
    ...(milestone.kind === 'all-of' ? { of: milestone.of } : {}),
    ...(plannedOn ? { plannedOn } : {}),
    reachedOn: reachedDay === null ? null : toIsoDate(reachedDay),
    probabilityReached: countUpTo(sorted, Number.MAX_VALUE) / draws,
    probabilityByPlanned: plannedDay === null ? null : countUpTo(sorted, plannedDay - cutoff) / draws,
    quantiles: perLevel((level) => dateOf(quantileType7(sorted, Number(level)))),
    monteCarloErrorDays: medianError(sorted),
    density: weeklyDensity(sorted, cutoff),
  };
}

function perLevel<T>(of: (level: QuantileLevel) => T): Record<QuantileLevel, T> {
  return Object.fromEntries(QUANTILE_LEVELS.map((level) => [level, of(level)])) as Record<QuantileLevel, T>;
}

/** How many of the sorted values are at most `limit`. */
function countUpTo(sorted: Float64Array, limit: number): number {
  let low = 0;
  let high = sorted.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((sorted[middle] as number) <= limit) low = middle + 1;
    else high = middle;
  }
  return low;
}

function weeklyDensity(sorted: Float64Array, cutoff: number): { from: IsoDate; share: number }[] {
  const weeks: { from: IsoDate; share: number }[] = [];
  const finite = countUpTo(sorted, Number.MAX_VALUE);
  let place = 0;
  while (place < finite) {
    const monday = mondayOf(dayOfMoment(sorted[place] as number, cutoff));
    const next = countUpTo(sorted, monday + 6 - cutoff);
    weeks.push({ from: toIsoDate(monday), share: (next - place) / sorted.length });
    place = next;
  }
  return weeks;
}

function monthlyRows(prepared: PreparedForecast, tally: Tally): MonthlyRow[] {
  const { cutoff, monthEnds, study } = prepared;
  const all = tally.allReached.slice(0, tally.draws).sort();
  const decisive = all[Math.max(0, Math.ceil(MONTHLY_SHARE * tally.draws - 1e-9) - 1)] as number;
  const lastMonth = decisive === Infinity ? Infinity : monthOrdinal(dayOfMoment(decisive, cutoff));
  const rows: MonthlyRow[] = [];
  monthEnds.forEach((moment, month) => {
    if (monthOrdinal(cutoff + moment) > lastMonth) return;
    rows.push({
      monthEnd: toIsoDate(cutoff + moment),
      randomised: countForecast(tally.randomised[month] as CountHistogram, tally.draws),
      ...(study.events ? { events: countForecast(tally.events[month] as CountHistogram, tally.draws) } : {}),
    });
  });
  return rows;
}

function countForecast(histogram: CountHistogram, draws: number): CountForecast {
  let sum = 0;
  histogram.frequencies.forEach((frequency, place) => {
    sum += frequency * (histogram.from + place);
  });
  return { mean: sum / draws, quantiles: perLevel((level) => quantileType1(histogram, draws, Number(level))) };
}
