import { addMonths, daysApart, monthEnd, monthOf, monthsFrom } from '../../dates';
import type { MilestoneForecast } from '../../engine/types';
import { formatDate, formatShortMonth } from '../../format';

/** A range on the mail's calendar, in percent of its width, with the words above it. */
export interface MailBracket {
  from: number;
  median: number;
  to: number;
  label: string;
}

export interface MailCalendar {
  years: { year: string; months: number }[];
  /** Each label spans so many months. */
  ticks: { label: string; months: number }[];
}

export interface MailBrackets {
  calendar: MailCalendar;
  now: MailBracket;
  before: MailBracket | null;
}

export interface DatedMilestone {
  publishedOn: string;
  milestone: MilestoneForecast;
}

/** At most so many labels fit beside each other at 600 px. */
const MOST_TICKS = 8;

/** Null where a range has an open end or the day is known: there is nothing to draw then. */
export function mailBrackets(now: DatedMilestone, before: DatedMilestone | null): MailBrackets | null {
  const current = range(now);
  if (!current) return null;
  const earlier = before && range(before);
  const ends = [current, ...(earlier ? [earlier] : [])];
  const first = addMonths(monthOf(ends.map((one) => one.from).sort()[0]!), -1);
  const last = addMonths(
    monthOf(
      ends
        .map((one) => one.to)
        .sort()
        .at(-1)!,
    ),
    1,
  );
  const wanted = monthsFrom(first, last).length;
  const step = Math.ceil(wanted / MOST_TICKS);
  const months = monthsFrom(first, addMonths(first, Math.ceil(wanted / step) * step - 1));
  const start = `${first}-01`;
  const width = daysApart(start, monthEnd(months.at(-1)!)) + 1;
  const place = (day: string): number => ((daysApart(start, day) + 1) / width) * 100;
  const bracket = ({ from, median, to, publishedOn }: NonNullable<ReturnType<typeof range>>): MailBracket => {
    const middle = Math.min(98, Math.max(2, place(median)));
    return {
      // The mark in the middle takes 2 % of the width; a very narrow range is drawn as wide as that.
      from: Math.max(0, Math.min(place(from), middle - 1)),
      median: middle,
      to: Math.min(100, Math.max(place(to), middle + 1)),
      label: `Published ${formatDate(publishedOn)}: median ${formatDate(median)}`,
    };
  };
  return { calendar: calendarOf(months, step), now: bracket(current), before: earlier ? bracket(earlier) : null };
}

function range({ publishedOn, milestone }: DatedMilestone) {
  const { '0.1': from, '0.5': median, '0.9': to } = milestone.quantiles;
  return milestone.reachedOn || !from || !median || !to ? null : { publishedOn, from, median, to };
}

function calendarOf(months: readonly string[], step: number): MailCalendar {
  const years = [...new Set(months.map((month) => month.slice(0, 4)))];
  return {
    years: years.map((year) => ({ year, months: months.filter((month) => month.startsWith(year)).length })),
    ticks: months
      .filter((_, place) => place % step === 0)
      .map((month) => ({ label: formatShortMonth(month), months: step })),
  };
}
