import { DAYS_PER_MONTH } from '@/lib/engine/calendar';
import type { EnrolmentModel } from '@/lib/engine/enrolment-model';
import type { EnrolmentSchedule } from '@/lib/engine/enrolment-schedule';
import { SWITCH } from '@/lib/engine/enrolment-schedule';
import { createEnrolmentSimulator } from '@/lib/engine/enrolment-simulate';
import { createGenerator } from '@/lib/engine/generator';
import type { PosteriorGrid } from '@/lib/engine/posterior-grid';

/** Sites as the outside values describe them: real numbers of months, which calendar dates cannot give. */
export interface KnownEnrolment {
  alpha: number;
  beta: number;
  n: readonly number[];
  t: readonly number[];
  /** Months after the cut-off at which further sites open, known. */
  newSites?: readonly number[];
  /** Month at which each present site closes. */
  closes?: readonly (number | null)[];
  cap?: number;
  grid?: PosteriorGrid;
  /** Patients until the target. */
  remaining: number;
  horizonMonths: number;
}

/** The engine's simulator of arrivals on such sites. Times of arrivals come in months, one array per draw. */
export function simulateKnown(known: KnownEnrolment, draws: number, seed = 11): Float64Array[] {
  const newSites = known.newSites ?? [];
  const counts = [...known.n, ...newSites.map(() => 0)];
  const exposures = [...known.t, ...newSites.map(() => 0)];
  const opens = [...known.n.map(() => 0), ...newSites];
  const closes = counts.map((_, site) => known.closes?.[site] ?? Infinity);
  const switches = opens
    .flatMap((open, site) => {
      const close = closes[site] as number;
      return [
        { at: open * DAYS_PER_MONTH, site, kind: SWITCH.on },
        ...(close < Infinity ? [{ at: close * DAYS_PER_MONTH, site, kind: SWITCH.off }] : []),
      ];
    })
    .filter(({ site }) => (closes[site] as number) > (opens[site] as number))
    .sort((a, b) => a.at - b.at);
  const room = counts.map((count) => Math.max(0, (known.cap ?? Infinity) - count));
  const sites = {
    counts: Float64Array.from(counts),
    exposures: Float64Array.from(exposures),
    ratios: Float64Array.from(counts, () => 1),
  };
  const model: EnrolmentModel = {
    planned: { meanPerMonth: known.alpha / known.beta, shape: known.alpha },
    grid: known.grid ?? null,
    calendars: [],
    sites,
  };
  const schedule: EnrolmentSchedule = {
    start: 0,
    horizon: known.horizonMonths * DAYS_PER_MONTH,
    remaining: known.remaining,
    ...sites,
    room: Float64Array.from(room),
    anyCap: known.cap !== undefined,
    startsSlow: new Uint8Array(counts.length),
    switchAt: Float64Array.from(switches, ({ at }) => at),
    switchSite: Int32Array.from(switches, ({ site }) => site),
    switchKind: Uint8Array.from(switches, ({ kind }) => kind),
    planned: new Int32Array(0),
    windows: [],
    closes: Float64Array.from(closes, (close) => close * DAYS_PER_MONTH),
    rampDays: 0,
    rampFraction: 1,
    seasonAt: Float64Array.of(0),
    seasonMultiplier: Float64Array.of(1),
    overdueSites: [],
  };
  const simulator = createEnrolmentSimulator(model, schedule, createGenerator(seed));
  return Array.from({ length: draws }, (_, draw) =>
    simulator.arrivals.slice(0, simulator.run(0, draw)).map((moment) => moment / DAYS_PER_MONTH),
  );
}

/** Arrivals up to a month, of each draw. */
export function countsAt(arrivals: readonly Float64Array[], month: number): number[] {
  return arrivals.map((moments) => moments.filter((moment) => moment <= month).length);
}
