import { formatDate } from './format';

export type WrittenDate = { date: string; fault?: undefined } | { fault: string };

const MONTHS = ['jan', 'feb', 'mar', 'apr', 'may', 'jun', 'jul', 'aug', 'sep', 'oct', 'nov', 'dec'];
const MONTH_NAMES =
  /^(jan(uary)?|feb(ruary)?|mar(ch)?|apr(il)?|may|june?|july?|aug(ust)?|sept?(ember)?|oct(ober)?|nov(ember)?|dec(ember)?)$/;

function isoOf(year: number, month: number, day: number): string | null {
  const iso = `${String(year).padStart(4, '0')}-${String(month).padStart(2, '0')}-${String(day).padStart(2, '0')}`;
  const time = Date.parse(`${iso}T00:00:00Z`);
  return !Number.isNaN(time) && new Date(time).toISOString().startsWith(iso) ? iso : null;
}

/** `2027-03-14`, `14 Mar 2027` or `14MAR2027` as a file has it. A date in figures that reads two ways is asked back with both readings. */
export function readWrittenDate(text: string): WrittenDate {
  const iso = /^(\d{4})-(\d{2})-(\d{2})$/.exec(text);
  const words = /^(\d{1,2})[ -]?([A-Za-z]{3,9})\.?[ -]?(\d{4})$/.exec(text);
  const name = words?.[2]?.toLowerCase() ?? '';
  const date = iso
    ? isoOf(Number(iso[1]), Number(iso[2]), Number(iso[3]))
    : words && MONTH_NAMES.test(name)
      ? isoOf(Number(words[3]), MONTHS.indexOf(name.slice(0, 3)) + 1, Number(words[1]))
      : null;
  if (date) return { date };
  const figures = /^(\d{1,2})[/. -](\d{1,2})[/. -](\d{4}|\d{2})$/.exec(text);
  const readings = figures
    ? readingsOf(Number(figures[1]), Number(figures[2]), Number(figures[3]) + (figures[3]!.length === 2 ? 2000 : 0))
    : [];
  if (readings.length === 2)
    return { fault: `“${text}” is ${readings.map(formatDate).join(' or ')}. Write ${readings.join(' or ')}.` };
  if (readings.length === 1) return { fault: `Write “${text}” as ${readings[0]} or ${formatDate(readings[0]!)}.` };
  return { fault: `“${text}” is not a date. Write it like 2027-03-14 or 14 Mar 2027.` };
}

function readingsOf(first: number, second: number, year: number): string[] {
  const readings = [isoOf(year, second, first), isoOf(year, first, second)].filter((iso) => iso !== null);
  return [...new Set(readings)];
}
