import { DAYS_PER_MONTH, monthOrdinal, monthStart, toDayNumber, toMonthOrdinal } from './calendar';
import type { Enrolment, IsoDate, Site } from './types';

/** A stretch of days, from the start of `from` to the start of `to` (day numbers). */
export interface DaySpan {
  from: number;
  to: number;
}

/** A site's calendar, in day numbers; spans are ordered and disjoint. */
export interface SiteCalendar {
  /** Start of the activation day; null: not active by the cut-off. */
  active: number | null;
  /** Start of the day after the closing day; Infinity: no closing date. */
  closed: number;
  /** Active and logged, up to the end of the cut-off day: what exposure counts. */
  logged: DaySpan[];
  /** Active before the end of the cut-off day but not logged: simulated like the future. */
  unlogged: DaySpan[];
}

/**
 * What is known of a site and when. Days: a site opens at the START of its activation day; closing, `loggedThrough` and
 * the cut-off hold to the END of theirs. A month that is not logged is not a zero: it gives no exposure.
 */
export function siteCalendar(site: Site, dataCutoff: IsoDate): SiteCalendar {
  const end = toDayNumber(dataCutoff) + 1;
  const closed = site.closedOn ? toDayNumber(site.closedOn) + 1 : Infinity;
  if (!site.activatedOn) return { active: null, closed, logged: [], unlogged: [] };
  const active = toDayNumber(site.activatedOn);
  const last = Math.min(end, closed);
  const loggedEnd = site.loggedThrough ? Math.min(toDayNumber(site.loggedThrough) + 1, last) : last;
  const logged: DaySpan[] = [];
  const unlogged: DaySpan[] = [];
  let from = active;
  for (const month of [...new Set(site.unlogged ?? [])].map(toMonthOrdinal).sort((a, b) => a - b)) {
    const gap = { from: Math.max(monthStart(month), active), to: Math.min(monthStart(month + 1), loggedEnd) };
    if (gap.from >= gap.to) continue;
    if (gap.from > from) logged.push({ from, to: gap.from });
    unlogged.push(gap);
    from = gap.to;
  }
  if (loggedEnd > from) logged.push({ from, to: loggedEnd });
  const late = Math.max(active, loggedEnd);
  if (last > late) unlogged.push({ from: late, to: last });
  return { active, closed, logged, unlogged };
}

/**
 * Exposure of a site in months: τ = ∫ s(t) r(t − u) dt over the days on which it was active and logged, s the seasonal
 * multiplier of the calendar month, r the ramp-up (`fraction` in the first `months` after activation day u, then 1).
 *
 * @returns months of 30.4375 days, at least 0
 * @see Anisimov & Fedorov 2007, Stat Med 26:4958 (constant rate: τ is the time active)
 */
export function siteExposure(calendar: SiteCalendar, enrolment: Pick<Enrolment, 'seasonality' | 'rampUp'>): number {
  if (calendar.active === null) return 0;
  const rampEnd = calendar.active + (enrolment.rampUp ? enrolment.rampUp.months * DAYS_PER_MONTH : 0);
  const fraction = enrolment.rampUp?.fraction ?? 1;
  let days = 0;
  for (const span of calendar.logged) {
    for (const piece of byMonth(span, enrolment.seasonality)) {
      const ramped = Math.max(0, Math.min(piece.to, rampEnd) - piece.from);
      days += piece.multiplier * (ramped * fraction + (piece.to - piece.from - ramped));
    }
  }
  return days / DAYS_PER_MONTH;
}

function byMonth(span: DaySpan, seasonality: readonly number[] | undefined): (DaySpan & { multiplier: number })[] {
  if (!seasonality) return [{ ...span, multiplier: 1 }];
  const pieces: (DaySpan & { multiplier: number })[] = [];
  let from = span.from;
  for (let month = monthOrdinal(span.from); from < span.to; month += 1) {
    const to = Math.min(span.to, monthStart(month + 1));
    pieces.push({ from, to, multiplier: seasonality[month % 12] ?? 1 });
    from = to;
  }
  return pieces;
}
