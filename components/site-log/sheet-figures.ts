import { formatLongMonth, formatQuantity } from '@/lib/format';
import { countFaults, type LoggableSite, type LoggedMonth } from '@/lib/site-log/rules';
import {
  LOG_FIELD_NAMES,
  LOG_FIELDS,
  type LogField,
  MOST_IN_A_MONTH,
  type MonthCounts,
  type MonthEntry,
} from '@/lib/site-log/schema';

/** What stands in the open cells, as typed. */
export type Typed = Record<string, Partial<Record<LogField, string>>>;

export const cellKey = (month: string, field: LogField): string => `${month}/${field}`;

/** What is wrong with a figure as typed, or null. */
export function figureFault(text: string): string | null {
  const plain = text.trim();
  if (/^\d+$/.test(plain))
    return Number(plain) <= MOST_IN_A_MONTH ? null : 'A month has at most 10,000. Check the figure.';
  const parted = /^(\d+)[.,](\d+)$/.exec(plain);
  if (parted)
    return `“${plain}”. Whole numbers only: ${Number(`${parted[1]}.${parted[2]}`)} or ${parted[1]}${parted[2]}?`;
  if (/^[-\u2212]\s*\d+$/.test(plain)) return 'A count is not below 0.';
  return `“${plain}” is not a whole number.`;
}

/** The typed cells of a month as figures, those that read as one. */
export function figuresOf(cells: Partial<Record<LogField, string>>): Partial<Record<LogField, number>> {
  const figures: Partial<Record<LogField, number>> = {};
  for (const field of LOG_FIELDS) {
    const text = cells[field]?.trim();
    if (text && figureFault(text) === null) figures[field] = Number(text);
  }
  return figures;
}

export function typedMonths(typed: Typed): string[] {
  const filled = (month: string): boolean => LOG_FIELDS.some((field) => (typed[month]?.[field] ?? '').trim() !== '');
  return Object.keys(typed).filter(filled).sort(); // prettier-ignore
}

const countsOf = ({ screened, failed, randomised, events, withdrawn }: MonthCounts): MonthCounts => ({
  screened,
  failed,
  randomised,
  events,
  withdrawn,
});

/** The months as they would stand once everything typed is saved. */
export function monthsWithTyped(months: readonly MonthEntry[], typed: Typed): LoggedMonth[] {
  return months.flatMap((entry) => {
    const row = { month: entry.month, ...countsOf(entry), ...figuresOf(typed[entry.month] ?? {}) };
    return LOG_FIELDS.some((field) => row[field] !== null) ? [row] : [];
  });
}

/** Everything wrong with what is typed, by cell: the figures themselves, then the sums since opening. */
export function typedFaults(months: readonly MonthEntry[], typed: Typed, site: LoggableSite): Record<string, string> {
  const faults: Record<string, string> = {};
  const before = monthsWithTyped(months, {});
  const after = monthsWithTyped(months, typed);
  for (const month of typedMonths(typed)) {
    for (const field of LOG_FIELDS) {
      const text = typed[month]?.[field]?.trim();
      const fault = text ? figureFault(text) : null;
      if (fault) faults[cellKey(month, field)] = fault;
    }
    for (const { field, detail } of countFaults(before, after, month, site)) faults[cellKey(month, field)] ??= detail;
  }
  return faults;
}

/** `5 screened, 1 failed, 3 randomised, 1 event`. */
export function countsInWords(counts: MonthCounts): string {
  const words: Record<LogField, (count: number) => string> = {
    screened: (count) => `${count} screened`,
    failed: (count) => `${count} failed`,
    randomised: (count) => `${count} randomised`,
    events: (count) => formatQuantity(count, 'event'),
    withdrawn: (count) => `${count} withdrawn`,
  };
  return LOG_FIELDS.flatMap((field) => (counts[field] === null ? [] : [words[field](counts[field])])).join(', ');
}

/** `Withdrawn is still empty.`, or nothing. */
export function stillEmpty(counts: MonthCounts): string {
  const names = LOG_FIELDS.filter((field) => counts[field] === null).map((field) => LOG_FIELD_NAMES[field]);
  if (names.length === 0 || names.length === LOG_FIELDS.length) return '';
  const list = names.map((name, place) => (place === 0 ? name : name.toLowerCase()));
  const last = list.pop()!;
  return list.length > 0 ? `${list.join(', ')} and ${last} are still empty.` : `${last} is still empty.`;
}

/** `March` where the year goes without saying, `March 2026` otherwise. */
export function monthName(month: string, today: string): string {
  return month.slice(0, 4) === today.slice(0, 4) ? formatLongMonth(month).split(' ')[0]! : formatLongMonth(month);
}

/** `Save March`, `Save November 2026 and March`. */
export function saveWords(months: readonly string[], today: string): string {
  const names = months.map((month) => monthName(month, today));
  if (names.length > 2) return `Save ${names.length} months`;
  return `Save ${names.join(' and ')}`;
}

/** `Wed 7 Apr`. */
export function dueWords(date: string): string {
  const day = new Date(`${date}T00:00:00Z`);
  const [weekday, month] = [day.getUTCDay(), day.getUTCMonth()];
  const names = ['Sun', 'Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat'];
  const months = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];
  return `${names[weekday]} ${day.getUTCDate()} ${months[month]}`;
}
