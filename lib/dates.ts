/* Calendar months and days as strings. A date here is what stands on the calendar, whatever the clock of the machine. */

/** `2027-03-14` -> `2027-03`. */
export function monthOf(date: string): string {
  return date.slice(0, 7);
}

/** Months counted from year 0, so that they can be added to and subtracted. */
function ordinalOf(month: string): number {
  return Number(month.slice(0, 4)) * 12 + Number(month.slice(5, 7)) - 1;
}

export function addMonths(month: string, count: number): string {
  const ordinal = ordinalOf(month) + count;
  return `${String(Math.floor(ordinal / 12)).padStart(4, '0')}-${String((ordinal % 12) + 1).padStart(2, '0')}`;
}

/** How many months from the first to the second, 0 for the same. */
export function monthsApart(from: string, to: string): number {
  return ordinalOf(to) - ordinalOf(from);
}

/** `2027-02` -> `2027-02-28`. */
export function monthEnd(month: string): string {
  return addDays(`${addMonths(month, 1)}-01`, -1);
}

/** Both ends included; none when the last lies before the first. */
export function monthsFrom(first: string, last: string): string[] {
  return Array.from({ length: Math.max(0, monthsApart(first, last) + 1) }, (_, place) => addMonths(first, place));
}

/** The last calendar month that is wholly over on this day. */
export function lastEndedMonth(today: string): string {
  return addMonths(monthOf(today), -1);
}

const DAY_MS = 86_400_000;

export function addDays(date: string, days: number): string {
  return new Date(Date.parse(date) + days * DAY_MS).toISOString().slice(0, 10);
}

/** Whole days from the first date to the second. */
export function daysApart(from: string, to: string): number {
  return Math.round((Date.parse(to) - Date.parse(from)) / DAY_MS);
}
