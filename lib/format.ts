/*
 * The one place where a date, a count or a probability becomes text. A calendar date stays a string throughout: no local
 * clock, no locale of the machine. Everything here is pure and runs anywhere.
 */

const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'] as const;
const LONG_MONTHS = [
  'January',
  'February',
  'March',
  'April',
  'May',
  'June',
  'July',
  'August',
  'September',
  'October',
  'November',
  'December',
] as const;

const NO_BREAK = '\u00a0';
const MINUS = '\u2212';

interface DateParts {
  year: number;
  month: number;
  day: number;
}

function partsOf(iso: string): DateParts {
  const match = /^(\d{4})-(\d{2})(?:-(\d{2}))?$/.exec(iso);
  const month = Number(match?.[2]);
  if (!match || month < 1 || month > 12) throw new RangeError(`Not a calendar date: ${iso}`);
  return { year: Number(match[1]), month, day: Number(match[3] ?? 1) };
}

const monthName = (month: number): string => MONTHS[month - 1] ?? '';

/** `2027-03-14` -> `14 Mar 2027`. */
export function formatDate(iso: string): string {
  const { year, month, day } = partsOf(iso);
  return `${day} ${monthName(month)} ${year}`;
}

/** `2027-03-14` -> `14 March 2027`, for titles. */
export function formatLongDate(iso: string): string {
  const { year, month, day } = partsOf(iso);
  return `${day} ${LONG_MONTHS[month - 1]} ${year}`;
}

/** `2027-03` or `2027-03-14` -> `Mar 2027`. */
export function formatMonth(iso: string): string {
  const { year, month } = partsOf(iso);
  return `${monthName(month)} ${year}`;
}

/** `2027-03` or `2027-03-14` -> `March 2027`, for titles. */
export function formatLongMonth(iso: string): string {
  const { year, month } = partsOf(iso);
  return `${LONG_MONTHS[month - 1]} ${year}`;
}

/** `2027-03` or `2027-03-14` -> `Mar`, for the ticks of an axis. */
export function formatShortMonth(iso: string): string {
  return monthName(partsOf(iso).month);
}

/**
 * A range of days, what both ends share said once: `3 to 23 Oct 2026`, `19 Jun to 2 Dec 2028`, `23 Nov 2027 to 3 Feb 2028`.
 * An end that is null lies beyond the forecast's horizon: `19 Jun 2028 or later`, `not reached`.
 */
export function formatDateRange(from: string | null, to: string | null): string {
  if (from === null) return 'not reached';
  if (to === null) return `${formatDate(from)} or later`;
  const start = partsOf(from);
  const end = partsOf(to);
  if (from === to) return formatDate(to);
  if (start.year !== end.year) return `${formatDate(from)} to ${formatDate(to)}`;
  if (start.month !== end.month) return `${start.day} ${monthName(start.month)} to ${formatDate(to)}`;
  return `${start.day} to ${formatDate(to)}`;
}

/** The same for months: `Nov 2027 to Feb 2028`, `Jun to Dec 2028`, `Nov 2027`, `Jun 2028 or later`. */
export function formatMonthRange(from: string | null, to: string | null): string {
  if (from === null) return 'not reached';
  if (to === null) return `${formatMonth(from)} or later`;
  const start = partsOf(from);
  const end = partsOf(to);
  if (start.year !== end.year) return `${formatMonth(from)} to ${formatMonth(to)}`;
  if (start.month !== end.month) return `${monthName(start.month)} to ${formatMonth(to)}`;
  return formatMonth(to);
}

/** A share from 0 to 1 as a whole percentage, `< 1 %` and `> 99 %` at the ends: a forecast is never certain. */
export function formatProbability(share: number): string {
  if (!Number.isFinite(share) || share < 0 || share > 1) throw new RangeError(`Not a probability: ${share}`);
  if (share < 0.01) return `<${NO_BREAK}1${NO_BREAK}%`;
  if (share > 0.99) return `>${NO_BREAK}99${NO_BREAK}%`;
  return formatPercent(share);
}

/** A share that is a plain proportion and may well be 0 or 1 (a band's promise, a share of logged sites): `80 %`. */
export function formatPercent(share: number, decimals = 0): string {
  return `${(share * 100).toFixed(decimals)}${NO_BREAK}%`;
}

/** `1200` -> `1,200`. */
export function formatCount(count: number): string {
  const digits = Math.abs(Math.round(count)).toString();
  const grouped = digits.replace(/\B(?=(\d{3})+$)/g, ',');
  return Math.round(count) < 0 ? `${MINUS}${grouped}` : grouped;
}

/** `0.5512` -> `0.55`: rates, shapes, errors. */
export function formatDecimal(value: number, decimals = 2): string {
  const text = Math.abs(value).toFixed(decimals);
  return value < 0 && Number(text) !== 0 ? `${MINUS}${text}` : text;
}

/** A range of counts: `1,045 to 1,120`, or the one number where both ends are it. */
export function formatCountRange(from: number, to: number): string {
  return from === to ? formatCount(to) : `${formatCount(from)} to ${formatCount(to)}`;
}

/** `1` -> `1 event`, `1200` -> `1,200 events`; a plural of its own may be given. */
export function formatQuantity(count: number, one: string, many = `${one}s`): string {
  return `${formatCount(count)} ${count === 1 ? one : many}`;
}

/** `288` -> `288th`, `1` -> `1st`. */
export function formatOrdinal(count: number): string {
  const tens = count % 100;
  const suffix = tens >= 11 && tens <= 13 ? 'th' : (['th', 'st', 'nd', 'rd'][count % 10] ?? 'th');
  return `${formatCount(count)}${suffix}`;
}

/** An instant in a named time zone (UTC unless one is given): `3 Mar 2027, 10:12`. */
export function formatInstant(instant: Date | string, timeZone = 'UTC'): string {
  const parts = new Intl.DateTimeFormat('en-GB', {
    timeZone,
    year: 'numeric',
    month: '2-digit',
    day: '2-digit',
    hour: '2-digit',
    minute: '2-digit',
    hourCycle: 'h23',
  }).formatToParts(new Date(instant));
  const part = (type: Intl.DateTimeFormatPartTypes): string => parts.find((one) => one.type === type)?.value ?? '';
  return `${formatDate(`${part('year')}-${part('month')}-${part('day')}`)}, ${part('hour')}:${part('minute')}`;
}

/** How far a date moved: `16 days later`, `1 day earlier`, `unchanged`. */
export function formatDaysMoved(days: number): string {
  const whole = Math.round(days);
  if (whole === 0) return 'unchanged';
  return `${formatQuantity(Math.abs(whole), 'day')} ${whole > 0 ? 'later' : 'earlier'}`;
}

/** With its sign, for tables of differences: `+16`, `−3`, `0`. */
export function formatSigned(value: number): string {
  const whole = Math.round(value);
  return whole > 0 ? `+${formatCount(whole)}` : formatCount(whole);
}

/** `85` -> `1 min 25 s`, `4` -> `4 s`: how long work took or will take. */
export function formatDuration(seconds: number): string {
  const whole = Math.max(0, Math.round(seconds));
  const minutes = Math.floor(whole / 60);
  if (minutes === 0) return `${whole}${NO_BREAK}s`;
  return whole % 60 === 0 ? `${minutes}${NO_BREAK}min` : `${minutes}${NO_BREAK}min ${whole % 60}${NO_BREAK}s`;
}

const CAUTION_MARKS = ['†', '‡', '§', '¶', '‖'] as const;

/** The footnote mark of the caution at this place in the list (0 first): † ‡ § ¶ ‖, then each doubled, then trebled. */
export function cautionMark(index: number): string {
  const mark = CAUTION_MARKS[index % CAUTION_MARKS.length] ?? '';
  return mark.repeat(Math.floor(index / CAUTION_MARKS.length) + 1);
}
