import type { ActivationWindow } from './activation';
import { DAYS_PER_MONTH, monthOrdinal, monthStart, toDayNumber } from './calendar';
import type { EnrolmentModel } from './enrolment-model';
import type { Study } from './types';

/** What happens to a site at a moment of the schedule; at one moment in this order. */
export const SWITCH = { off: 0, on: 1, fullSpeed: 2 } as const;

/**
 * What the simulation of arrivals needs and what is the same in each draw. Moments are days after the end of the cut-off
 * day; sites are only those that may still enrol, so they are numbered anew.
 */
export interface EnrolmentSchedule {
  /** Where the simulation starts: 0, or earlier where months are not logged. */
  start: number;
  horizon: number;
  /** Patients that may still come until the target. */
  remaining: number;
  /** Posterior's ingredients of each site. */
  counts: Float64Array;
  exposures: Float64Array;
  ratios: Float64Array;
  /** Patients until the site's cap; Infinity: it has none, or one that the target keeps it from. */
  room: Float64Array;
  anyCap: boolean;
  /** 1: the site starts in its ramp-up. */
  startsSlow: Uint8Array;
  /** Known switches in the order of time. */
  switchAt: Float64Array;
  switchSite: Int32Array;
  switchKind: Uint8Array;
  /** Sites that are not active yet, and their windows; null: overdue. */
  planned: Int32Array;
  windows: (ActivationWindow | null)[];
  /** Moment after which a site takes nobody. */
  closes: Float64Array;
  /** Length of the ramp-up in days, 0 without, and the share of the rate in it. */
  rampDays: number;
  rampFraction: number;
  /** Starts of calendar months and the multipliers from there; one entry without seasonality. */
  seasonAt: Float64Array;
  seasonMultiplier: Float64Array;
  /** Places in the study of the sites that are overdue. */
  overdueSites: number[];
}

/** Lays out the future of enrolment: who may enrol from when to when, and what is known of it. */
export function scheduleEnrolment(study: Study, model: EnrolmentModel, horizon: number): EnrolmentSchedule {
  const { enrolment } = study;
  const end = toDayNumber(study.dataCutoff) + 1;
  const randomised = enrolment.sites.reduce((sum, site) => sum + (site.randomised ?? 0), 0);
  const remaining = Math.max(0, enrolment.target - randomised);
  const rampDays = enrolment.rampUp ? enrolment.rampUp.months * DAYS_PER_MONTH : 0;
  const chosen: number[] = [];
  const closes: number[] = [];
  const startsSlow: number[] = [];
  const planned: number[] = [];
  const windows: (ActivationWindow | null)[] = [];
  const overdueSites: number[] = [];
  const switches: { at: number; site: number; kind: number }[] = [];
  let start = 0;

  enrolment.sites.forEach((site, place) => {
    const calendar = model.calendars[place];
    if (!calendar || (site.cap ?? Infinity) <= (site.randomised ?? 0)) return;
    const number = chosen.length;
    const closing = calendar.closed - end;
    if (calendar.active !== null) {
      const spans = calendar.unlogged.map(({ from, to }) => ({ from: from - end, to: to - end }));
      const last = spans[spans.length - 1];
      if (closing > 0) {
        // Unlogged up to the cut-off: one stretch with the future.
        if (last && last.to === 0) last.to = closing;
        else spans.push({ from: 0, to: closing });
      }
      const first = spans[0];
      if (!first) return;
      const full = calendar.active - end + rampDays;
      startsSlow.push(full > first.from ? 1 : 0);
      if (full > first.from) switches.push({ at: full, site: number, kind: SWITCH.fullSpeed });
      for (const { from, to } of spans) {
        switches.push({ at: from, site: number, kind: SWITCH.on });
        if (to < Infinity) switches.push({ at: to, site: number, kind: SWITCH.off });
        start = Math.min(start, from);
      }
    } else if (site.planned && closing > 0) {
      const window = {
        earliest: toDayNumber(site.planned.earliest) - end,
        likely: toDayNumber(site.planned.likely) - end,
        latest: toDayNumber(site.planned.latest) - end,
      };
      const overdue = window.latest <= 0;
      if (overdue) overdueSites.push(place);
      planned.push(number);
      windows.push(overdue ? null : window);
      startsSlow.push(rampDays > 0 ? 1 : 0);
      if (closing < Infinity) switches.push({ at: closing, site: number, kind: SWITCH.off });
    } else {
      return;
    }
    chosen.push(place);
    closes.push(closing);
  });

  switches.sort((a, b) => a.at - b.at || a.kind - b.kind || a.site - b.site);
  const room = chosen.map((place) => {
    const left = (enrolment.sites[place]?.cap ?? Infinity) - (enrolment.sites[place]?.randomised ?? 0);
    return left < remaining ? left : Infinity;
  });
  const season = seasons(enrolment.seasonality, end, start, horizon);
  return {
    start,
    horizon,
    remaining,
    counts: Float64Array.from(chosen, (place) => model.sites.counts[place] as number),
    exposures: Float64Array.from(chosen, (place) => model.sites.exposures[place] as number),
    ratios: Float64Array.from(chosen, (place) => model.sites.ratios[place] as number),
    room: Float64Array.from(room),
    anyCap: room.some((left) => left < Infinity),
    startsSlow: Uint8Array.from(startsSlow),
    switchAt: Float64Array.from(switches, ({ at }) => at),
    switchSite: Int32Array.from(switches, ({ site }) => site),
    switchKind: Uint8Array.from(switches, ({ kind }) => kind),
    planned: Int32Array.from(planned),
    windows,
    closes: Float64Array.from(closes),
    rampDays,
    rampFraction: enrolment.rampUp?.fraction ?? 1,
    seasonAt: season.at,
    seasonMultiplier: season.multiplier,
    overdueSites,
  };
}

function seasons(seasonality: readonly number[] | undefined, end: number, start: number, horizon: number) {
  const at: number[] = [start];
  if (!seasonality) return { at: Float64Array.from(at), multiplier: Float64Array.of(1) };
  const first = monthOrdinal(end + Math.floor(start));
  const multiplier: number[] = [seasonality[first % 12] ?? 1];
  for (let month = first + 1; monthStart(month) - end < horizon; month += 1) {
    at.push(monthStart(month) - end);
    multiplier.push(seasonality[month % 12] ?? 1);
  }
  return { at: Float64Array.from(at), multiplier: Float64Array.from(multiplier) };
}
