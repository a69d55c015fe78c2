/**
 * Calendar dates as day numbers: whole days since 1970-01-01 in the proleptic Gregorian calendar, by integer arithmetic
 * alone. No `Date`, so no time zone can touch a forecast.
 *
 * The engine's moments are real numbers of days after the END of the cut-off day. With c the day number of the cut-off,
 * day d starts at the moment d - c - 1 and ends at d - c; a moment t falls on day c + ceil(t).
 */
import type { IsoDate, IsoMonth } from './types';

/** A month wherever a rate or a duration is meant: 365.25 / 12 days. */
export const DAYS_PER_MONTH = 30.4375;

const DAYS_PER_ERA = 146_097;
const EPOCH_OFFSET = 719_468;

function dayNumberOf(year: number, month: number, day: number): number {
  const shiftedYear = month <= 2 ? year - 1 : year;
  const era = Math.floor(shiftedYear / 400);
  const yearOfEra = shiftedYear - era * 400;
  const dayOfYear = Math.floor((153 * (month + (month > 2 ? -3 : 9)) + 2) / 5) + day - 1;
  const dayOfEra = yearOfEra * 365 + Math.floor(yearOfEra / 4) - Math.floor(yearOfEra / 100) + dayOfYear;
  return era * DAYS_PER_ERA + dayOfEra - EPOCH_OFFSET;
}

function partsOf(dayNumber: number): { year: number; month: number; day: number } {
  const shifted = dayNumber + EPOCH_OFFSET;
  const era = Math.floor(shifted / DAYS_PER_ERA);
  const dayOfEra = shifted - era * DAYS_PER_ERA;
  const yearOfEra = Math.floor(
    (dayOfEra - Math.floor(dayOfEra / 1460) + Math.floor(dayOfEra / 36_524) - Math.floor(dayOfEra / 146_096)) / 365,
  );
  const dayOfYear = dayOfEra - (365 * yearOfEra + Math.floor(yearOfEra / 4) - Math.floor(yearOfEra / 100));
  const shiftedMonth = Math.floor((5 * dayOfYear + 2) / 153);
  const day = dayOfYear - Math.floor((153 * shiftedMonth + 2) / 5) + 1;
  const month = shiftedMonth < 10 ? shiftedMonth + 3 : shiftedMonth - 9;
  return { year: yearOfEra + era * 400 + (month <= 2 ? 1 : 0), month, day };
}

/**
 * Day number of a calendar date.
 *
 * @param date `YYYY-MM-DD`
 * @returns whole days since 1970-01-01
 * @throws RangeError where the string is no date of the calendar
 * @see H. Hinnant, "chrono-Compatible Low-Level Date Algorithms", days_from_civil
 */
export function toDayNumber(date: IsoDate): number {
  const match = /^(\d{4})-(\d{2})-(\d{2})$/.exec(date);
  if (!match) throw new RangeError(`“${date}” is no calendar date in the form YYYY-MM-DD.`);
  const number = dayNumberOf(Number(match[1]), Number(match[2]), Number(match[3]));
  if (toIsoDate(number) !== date) throw new RangeError(`“${date}” is no date of the calendar.`);
  return number;
}

/**
 * Calendar date of a day number, `YYYY-MM-DD`; the inverse of {@link toDayNumber}.
 *
 * @param dayNumber whole days since 1970-01-01
 */
export function toIsoDate(dayNumber: number): IsoDate {
  const { year, month, day } = partsOf(dayNumber);
  return `${String(year).padStart(4, '0')}-${String(month).padStart(2, '0')}-${String(day).padStart(2, '0')}`;
}

/** Months since year 0 of the month that holds a day; makes months countable. */
export function monthOrdinal(dayNumber: number): number {
  const { year, month } = partsOf(dayNumber);
  return year * 12 + month - 1;
}

/** Months since year 0 of `YYYY-MM`. */
export function toMonthOrdinal(month: IsoMonth): number {
  return Number(month.slice(0, 4)) * 12 + Number(month.slice(5, 7)) - 1;
}

/** Day number of the first day of a month, given its ordinal. */
export function monthStart(ordinal: number): number {
  return dayNumberOf(Math.floor(ordinal / 12), (ordinal % 12) + 1, 1);
}

/** Day number of the last day of a month, given its ordinal. */
export function monthEnd(ordinal: number): number {
  return monthStart(ordinal + 1) - 1;
}

/** Day number of the Monday on or before a day (1970-01-01 was a Thursday). */
export function mondayOf(dayNumber: number): number {
  const sinceMonday = (((dayNumber + 3) % 7) + 7) % 7;
  return dayNumber - sinceMonday;
}

/**
 * The day on which a moment falls.
 *
 * @param moment days after the end of the cut-off day
 * @param cutoff day number of the cut-off
 */
export function dayOfMoment(moment: number, cutoff: number): number {
  return cutoff + Math.ceil(moment);
}
