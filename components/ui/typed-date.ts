export type TypedDate =
  | { kind: 'empty' }
  | { kind: 'date'; iso: string }
  /** Two readings that are both dates: it is asked which was meant, day first then month first. */
  | { kind: 'ambiguous'; readings: [string, string] }
  | { kind: 'unreadable' };

const MONTHS = ['jan', 'feb', 'mar', 'apr', 'may', 'jun', 'jul', 'aug', 'sep', 'oct', 'nov', 'dec'];

function isoOf(year: number, month: number, day: number): string | null {
  const date = new Date(Date.UTC(year, month - 1, day));
  const holds = date.getUTCFullYear() === year && date.getUTCMonth() === month - 1 && date.getUTCDate() === day;
  return holds ? date.toISOString().slice(0, 10) : null;
}

function asDate(iso: string | null): TypedDate {
  return iso === null ? { kind: 'unreadable' } : { kind: 'date', iso };
}

function monthNumber(name: string): number {
  return MONTHS.indexOf(name.slice(0, 3).toLowerCase()) + 1;
}

/**
 * Reads a date as people type it: `2027-03-14`, `14 Mar 2027`, `14 March 27`, `Mar 14, 2027`, `14/03/2027`. A date in
 * figures only that reads two ways (03/04/27) is never guessed at.
 */
export function readTypedDate(typed: string): TypedDate {
  const text = typed.trim();
  if (text === '') return { kind: 'empty' };
  const century = (year: string): number => (year.length === 2 ? 2000 + Number(year) : Number(year));

  const iso = /^(\d{4})[-/.](\d{1,2})[-/.](\d{1,2})$/.exec(text);
  if (iso) return asDate(isoOf(Number(iso[1]), Number(iso[2]), Number(iso[3])));

  const dayFirst = /^(\d{1,2})(?:st|nd|rd|th)?[\s.-]*([a-z]{3,9})\.?,?[\s.-]*(\d{4}|\d{2})$/i.exec(text);
  if (dayFirst) return asDate(isoOf(century(dayFirst[3] ?? ''), monthNumber(dayFirst[2] ?? ''), Number(dayFirst[1])));

  const monthFirst = /^([a-z]{3,9})\.?\s*(\d{1,2})(?:st|nd|rd|th)?,?\s+(\d{4}|\d{2})$/i.exec(text);
  if (monthFirst)
    return asDate(isoOf(century(monthFirst[3] ?? ''), monthNumber(monthFirst[1] ?? ''), Number(monthFirst[2])));

  const figures = /^(\d{1,2})[-/. ](\d{1,2})[-/. ](\d{4}|\d{2})$/.exec(text);
  if (!figures) return { kind: 'unreadable' };
  const [first, second, year] = [Number(figures[1]), Number(figures[2]), century(figures[3] ?? '')];
  const asDayFirst = isoOf(year, second, first);
  const asMonthFirst = isoOf(year, first, second);
  if (asDayFirst && asMonthFirst && asDayFirst !== asMonthFirst)
    return { kind: 'ambiguous', readings: [asDayFirst, asMonthFirst] };
  return asDate(asDayFirst ?? asMonthFirst);
}
