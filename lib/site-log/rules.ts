import { addMonths, lastEndedMonth, monthOf, monthsFrom } from '../dates';
import { formatDate, formatLongMonth, formatMonth } from '../format';
import { LOG_FIELDS, type LogField, type MonthCounts, type MonthState } from './schema';

/** What the rules need to know of a site. */
export interface LoggableSite {
  activatedOn: string | null;
  closedOn: string | null;
  cap: number | null;
}

export interface LoggedMonth extends MonthCounts {
  month: string;
}

export interface CellFault {
  field: LogField;
  detail: string;
}

export const NO_COUNTS: MonthCounts = { screened: null, failed: null, randomised: null, events: null, withdrawn: null };

/** A month's sheet is due on the seventh of the month after it. */
export function dueOn(month: string): string {
  return `${addMonths(month, 1)}-07`;
}

export function monthState(counts: MonthCounts): MonthState {
  const filled = LOG_FIELDS.filter((field) => counts[field] !== null).length;
  if (filled === 0) return 'missing';
  return filled === LOG_FIELDS.length ? 'reported' : 'incomplete';
}

/** The months that can be logged: from that of the activation to the last one over, or to that of the closure. */
export function loggableMonths(site: LoggableSite, today: string): string[] {
  if (!site.activatedOn) return [];
  const ended = lastEndedMonth(today);
  const closed = site.closedOn ? monthOf(site.closedOn) : ended;
  return monthsFrom(monthOf(site.activatedOn), closed < ended ? closed : ended);
}

/** The month that runs now, if the site is open in it. */
export function runningMonth(site: LoggableSite, today: string): string | null {
  const month = monthOf(today);
  if (!site.activatedOn || monthOf(site.activatedOn) > month) return null;
  return site.closedOn && monthOf(site.closedOn) < month ? null : month;
}

/** Why nothing can be logged for this month, or null. */
export function monthFault(site: LoggableSite, month: string, today: string): string | null {
  if (!site.activatedOn) return 'This site has not been activated yet, so there is no month to log.';
  if (month < monthOf(site.activatedOn)) {
    return `The site opened on ${formatDate(site.activatedOn)}. Log ${formatLongMonth(site.activatedOn)} and later months.`;
  }
  if (site.closedOn && month > monthOf(site.closedOn)) {
    return `The site closed on ${formatDate(site.closedOn)}. Log months up to ${formatLongMonth(site.closedOn)}.`;
  }
  if (month > lastEndedMonth(today)) {
    return `${formatLongMonth(month)} is not over yet. It can be logged from ${formatDate(`${addMonths(month, 1)}-01`)}.`;
  }
  return null;
}

/** Sums over what is logged; a figure that was not reported adds nothing. */
export function totalsOf(months: readonly MonthCounts[]): Record<LogField, number> {
  const totals = { screened: 0, failed: 0, randomised: 0, events: 0, withdrawn: 0 };
  for (const month of months) for (const field of LOG_FIELDS) totals[field] += month[field] ?? 0;
  return totals;
}

/** Figures that can't exceed others since the site opened. */
interface Limit {
  parts: readonly LogField[];
  /** The column whose sum is the limit; null: the site's cap is. */
  within: LogField | null;
  says: (sums: Record<LogField, number>, since: string, cap: number) => string;
}

const LIMITS: readonly Limit[] = [
  {
    parts: ['failed', 'randomised'],
    within: 'screened',
    says: (sums, since) =>
      `That makes ${sums.failed} failed and ${sums.randomised} randomised ${since}, of ${sums.screened} screened.`,
  },
  {
    parts: ['events', 'withdrawn'],
    within: 'randomised',
    says: (sums, since) =>
      `That makes ${sums.events} with an event and ${sums.withdrawn} withdrawn ${since}, of ${sums.randomised} randomised.`,
  },
  {
    parts: ['randomised'],
    within: null,
    says: (sums, since, cap) => `That makes ${sums.randomised} randomised ${since}; the site’s cap is ${cap}.`,
  },
];

const AT_MOST: Record<LogField, string> = {
  screened: 'can have been screened',
  failed: 'can have failed',
  randomised: 'can have been randomised',
  events: 'can have had an event',
  withdrawn: 'can have withdrawn',
};

/** How far the months up to one are over a limit; nothing is said while that month's own limiting figure is empty. */
function excessAt(limit: Limit, months: readonly LoggedMonth[], upTo: string, cap: number | null): number {
  const known = months.filter((one) => one.month <= upTo);
  const within = limit.within;
  if (within === null && cap === null) return 0;
  if (within !== null && known.some((one) => one.month === upTo && one[within] === null)) return 0;
  const sums = totalsOf(known);
  return limit.parts.reduce((sum, part) => sum + sums[part], 0) - (within === null ? cap! : sums[within]);
}

/**
 * What a save of one month would break, cell by cell. A save is refused only for what it makes worse: an older flaw
 * elsewhere does not lock the sheet, and a correction of an early month is judged at every later month-end too.
 */
export function countFaults(
  before: readonly LoggedMonth[],
  after: readonly LoggedMonth[],
  month: string,
  site: LoggableSite,
): CellFault[] {
  const rowOf = (months: readonly LoggedMonth[]): MonthCounts => months.find((one) => one.month === month) ?? NO_COUNTS;
  const [old, row] = [rowOf(before), rowOf(after)];
  const changed = LOG_FIELDS.filter((field) => old[field] !== row[field]);
  const monthEnds = after.map((one) => one.month).filter((one) => one >= month).sort(); // prettier-ignore
  return LIMITS.flatMap((limit) => {
    for (const upTo of monthEnds) {
      const excess = excessAt(limit, after, upTo, site.cap);
      const worse = excess - Math.max(0, excessAt(limit, before, upTo, site.cap));
      if (excess > 0 && worse > 0) return [faultAt(limit, { after, upTo, excess, row, changed, month, site })];
    }
    return [];
  });
}

interface Breach {
  after: readonly LoggedMonth[];
  upTo: string;
  excess: number;
  row: MonthCounts;
  changed: readonly LogField[];
  month: string;
  site: LoggableSite;
}

/** Points at the changed figure that can put it right, and says what it could be. */
function faultAt(limit: Limit, { after, upTo, excess, row, changed, month, site }: Breach): CellFault {
  const sums = totalsOf(after.filter((one) => one.month <= upTo));
  const since = upTo === month ? 'since opening' : `by ${formatMonth(upTo)}`;
  const parts = limit.parts.filter((part) => changed.includes(part));
  const field = parts.find((part) => (row[part] ?? 0) >= excess) ?? parts[0] ?? limit.within ?? limit.parts[0]!;
  const room = (row[field] ?? 0) - excess;
  const when = `in ${formatLongMonth(month)}`;
  const right = !limit.parts.includes(field)
    ? `At least ${(row[field] ?? 0) + excess} were ${field} ${when}, then.`
    : room >= 0
      ? `At most ${room} ${AT_MOST[field]} ${when}.`
      : 'Check the months before it too.';
  return {
    field,
    detail: [limit.says(sums, since, site.cap ?? 0), right, gapHint(limit, after, upTo, site)]
      .filter(Boolean)
      .join(' '),
  };
}

/** A gap may hold the missing patients: then it is to be logged first. */
function gapHint(limit: Limit, after: readonly LoggedMonth[], upTo: string, site: LoggableSite): string {
  const within = limit.within;
  if (within === null || !site.activatedOn) return '';
  const filled = new Set(after.filter((one) => one[within] !== null).map((one) => one.month));
  const gap = monthsFrom(monthOf(site.activatedOn), upTo).find((month) => !filled.has(month));
  return gap ? `${formatLongMonth(gap)} is not logged: log it first if they were ${within} then.` : '';
}
