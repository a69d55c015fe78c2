import { CsvError, parse } from 'csv-parse/sync';
import { type FieldFault, InvalidError } from '../errors';
import { formatDate } from '../format';
import { addSiteBody, type SiteField, type SiteInput } from '../sites/schema';
import { NOTHING_LOGGED, siteFaults } from '../sites/rules';
import { armColumnFault, isArmColumn } from '../study-file/arm-columns';
import { LIST_COLUMNS, type ListColumn, MOST_LISTED_SITES, NEEDED_COLUMNS } from './schema';

const MOST_COLUMNS = 50;
/** A file wrong in every row is told so once; nobody reads ten thousand lines. */
const MOST_FAULTS = 500;

const FIELD_OF: Record<ListColumn, SiteField> = {
  code: 'code',
  name: 'name',
  city: 'city',
  country: 'country',
  earliest: 'plannedEarliest',
  likely: 'plannedLikely',
  latest: 'plannedLatest',
  activated: 'activatedOn',
  closed: 'closedOn',
  cap: 'cap',
};
const COLUMN_OF = Object.fromEntries(LIST_COLUMNS.map((column) => [FIELD_OF[column], column])) as Record<
  SiteField,
  ListColumn
>;

/** A site and where it stands in the file; the head is row 1. */
export interface ListedRow {
  row: number;
  site: SiteInput;
}

/** Reads a site list, or refuses it with every fault by row and column. Nothing is guessed at. */
export function readSiteList(bytes: Uint8Array, today: string): ListedRow[] {
  const records = recordsOf(textOf(bytes));
  const [head, ...rows] = records;
  if (!head || head.every((cell) => cell.trim() === ''))
    throw fileFault('The file is empty. The first row names the columns: ' + LIST_COLUMNS.join(', ') + '.');
  const columns = columnsOf(head);
  const filled = rows
    .map((cells, place) => ({ row: place + 2, cells }))
    .filter(({ cells }) => cells.some((cell) => cell.trim() !== ''));
  if (filled.length === 0) throw fileFault('The file has a head and no sites. Give one row for each site.');
  if (filled.length > MOST_LISTED_SITES)
    throw fileFault(`The file has ${filled.length} sites; a list has at most ${MOST_LISTED_SITES}.`);
  const faults: FieldFault[] = [];
  const listed = filled.flatMap(({ row, cells }) => {
    const read = readRow(cells, columns, row, today);
    faults.push(...read.faults);
    return read.site ? [{ row, site: read.site }] : [];
  });
  faults.push(...repeatedCodes(listed));
  refuseAll(faults);
  return listed;
}

/** All faults in the order of the rows, the first five hundred spelt out. */
export function refuseAll(faults: readonly FieldFault[]): void {
  if (faults.length === 0) return;
  const rowOf = (fault: FieldFault): number => Number(/^\/rows\/(\d+)/.exec(fault.pointer)?.[1] ?? 0);
  const sorted = faults.toSorted((a, b) => rowOf(a) - rowOf(b));
  const rest = sorted.length - MOST_FAULTS;
  if (rest <= 0) throw new InvalidError(sorted);
  throw new InvalidError(
    [...sorted.slice(0, MOST_FAULTS), { pointer: '/file', detail: `And ${rest} more of these.` }],
    `${sorted.length} things need to be put right.`,
  );
}

export function rowFault(row: number, column: ListColumn, detail: string): FieldFault {
  return { pointer: `/rows/${row}/${column}`, detail: `Row ${row}, ${column}: ${detail}` };
}

function fileFault(detail: string): InvalidError {
  return new InvalidError([{ pointer: '/file', detail }]);
}

function textOf(bytes: Uint8Array): string {
  if (bytes.length === 0) throw fileFault('The file is empty. Choose a CSV file with the site list.');
  const encoding =
    bytes[0] === 0xff && bytes[1] === 0xfe ? 'utf-16le' : bytes[0] === 0xfe && bytes[1] === 0xff ? 'utf-16be' : 'utf-8';
  let text: string;
  try {
    text = new TextDecoder(encoding, { fatal: true }).decode(bytes);
  } catch {
    throw fileFault('The file is not text in UTF-8. Save it as “CSV UTF-8” and choose it again.');
  }
  if (text.includes('\0'))
    throw fileFault('The file is not a text file. Save the list as “CSV UTF-8” and choose it again.');
  return text;
}

function recordsOf(text: string): string[][] {
  const firstLine = text.slice(0, 10_000).split(/\r?\n|\r/, 1)[0]!;
  const separators = [',', ';', '\t'];
  const counts = separators.map((separator) => firstLine.split(separator).length);
  const delimiter = separators[counts.indexOf(Math.max(...counts))]!;
  try {
    return parse(text, {
      delimiter,
      relax_column_count: true,
      skip_empty_lines: false,
      max_record_size: 100_000,
      to: MOST_LISTED_SITES * 2,
    });
  } catch (error) {
    if (!(error instanceof CsvError)) throw error;
    const where = typeof error.lines === 'number' ? `Line ${error.lines}` : 'One line';
    const what =
      error.code === 'CSV_MAX_RECORD_SIZE'
        ? 'is far longer than a site needs. Check its quotation marks'
        : 'has a quotation mark that opens or closes in the wrong place';
    throw fileFault(`${where} ${what}.`);
  }
}

/** Which column stands at which place; refused with every fault of the head at once. */
function columnsOf(head: readonly string[]): ListColumn[] {
  if (head.length > MOST_COLUMNS)
    throw fileFault(
      `The head has ${head.length} columns; a site list has ${LIST_COLUMNS.length}: ${LIST_COLUMNS.join(', ')}.`,
    );
  const faults: FieldFault[] = [];
  const names = head.map((cell) => cell.trim().toLowerCase());
  names.forEach((name, place) => {
    const at = { pointer: `/columns/${place}` };
    if (isArmColumn(name)) faults.push({ ...at, detail: armColumnFault(head[place]!.trim(), place + 1) });
    else if (!LIST_COLUMNS.includes(name as ListColumn)) {
      faults.push({
        ...at,
        detail: `Column ${place + 1}, “${head[place]!.trim()}”, is not one of a site list. It has ${LIST_COLUMNS.join(', ')}.`,
      });
    } else if (names.indexOf(name) !== place)
      faults.push({ ...at, detail: `Column ${place + 1} is a second “${name}”. Leave one out.` });
  });
  for (const needed of NEEDED_COLUMNS)
    if (!names.includes(needed))
      faults.push({ pointer: '/columns', detail: `There is no column “${needed}”. Add it to the head.` });
  if (faults.length > 0) throw new InvalidError(faults);
  return names as ListColumn[];
}

function readRow(
  cells: readonly string[],
  columns: readonly ListColumn[],
  row: number,
  today: string,
): { site: SiteInput | null; faults: FieldFault[] } {
  if (cells.length !== columns.length) {
    return {
      site: null,
      faults: [
        {
          pointer: `/rows/${row}`,
          detail: `Row ${row} has ${cells.length} cells, the head ${columns.length}. A comma inside a name needs quotation marks around it.`,
        },
      ],
    };
  }
  const faults: FieldFault[] = [];
  const raw: Record<string, string | number | null> = {
    plannedEarliest: null,
    plannedLikely: null,
    plannedLatest: null,
    activatedOn: null,
    closedOn: null,
    cap: null,
  };
  columns.forEach((column, place) => {
    const read = readCell(column, cells[place]!.trim());
    if (read.fault !== undefined) faults.push(rowFault(row, column, read.fault));
    else raw[FIELD_OF[column]] = read.value;
  });
  if (faults.length > 0) return { site: null, faults };
  const checked = addSiteBody.safeParse(raw);
  if (!checked.success)
    return {
      site: null,
      faults: checked.error.issues.map((issue) => rowFault(row, COLUMN_OF[issue.path[0] as SiteField], issue.message)),
    };
  const broken = siteFaults(checked.data, NOTHING_LOGGED, today);
  return { site: checked.data, faults: broken.map(({ field, detail }) => rowFault(row, COLUMN_OF[field], detail)) };
}

type Cell = { value: string | number | null; fault?: undefined } | { fault: string };

function readCell(column: ListColumn, text: string): Cell {
  if (column === 'code' || column === 'name' || column === 'city' || column === 'country') return { value: text };
  if (text === '') return { value: null };
  if (column !== 'cap') return readDate(text);
  return /^\d{1,7}$/.test(text)
    ? { value: Number(text) }
    : { fault: `“${text}” is not a whole number in plain figures, for example 40.` };
}

const MONTHS = ['jan', 'feb', 'mar', 'apr', 'may', 'jun', 'jul', 'aug', 'sep', 'oct', 'nov', 'dec'];
const MONTH_NAMES =
  /^(jan(uary)?|feb(ruary)?|mar(ch)?|apr(il)?|may|june?|july?|aug(ust)?|sept?(ember)?|oct(ober)?|nov(ember)?|dec(ember)?)$/;

function isoOf(year: number, month: number, day: number): string | null {
  const iso = `${String(year).padStart(4, '0')}-${String(month).padStart(2, '0')}-${String(day).padStart(2, '0')}`;
  const time = Date.parse(`${iso}T00:00:00Z`);
  return !Number.isNaN(time) && new Date(time).toISOString().startsWith(iso) ? iso : null;
}

/** `2027-03-14` or `14 Mar 2027`. A date in figures that reads two ways is asked back with both readings. */
function readDate(text: string): Cell {
  const iso = /^(\d{4})-(\d{2})-(\d{2})$/.exec(text);
  const words = /^(\d{1,2})[ -]([A-Za-z]{3,9})\.?[ -](\d{4})$/.exec(text);
  const name = words?.[2]?.toLowerCase() ?? '';
  const read = iso
    ? isoOf(Number(iso[1]), Number(iso[2]), Number(iso[3]))
    : words && MONTH_NAMES.test(name)
      ? isoOf(Number(words[3]), MONTHS.indexOf(name.slice(0, 3)) + 1, Number(words[1]))
      : null;
  if (read) return { value: read };
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

function repeatedCodes(listed: readonly ListedRow[]): FieldFault[] {
  const first = new Map<string, number>();
  return listed.flatMap(({ row, site }) => {
    const code = site.code.toLowerCase();
    const earlier = first.get(code);
    if (earlier === undefined) first.set(code, row);
    return earlier === undefined
      ? []
      : [rowFault(row, 'code', `${site.code} stands in row ${earlier} already. Each site has a code of its own.`)];
  });
}
