import { decodeText, fileFault, readRecords } from '../delimited';
import { type FieldFault, InvalidError } from '../errors';
import { addSiteBody, type SiteField, type SiteInput } from '../sites/schema';
import { NOTHING_LOGGED, siteFaults } from '../sites/rules';
import { armColumnFault, isArmColumn } from '../study-file/arm-columns';
import { readWrittenDate } from '../written-date';
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
  const [head, ...rows] = readRecords(decodeText(bytes), MOST_LISTED_SITES * 2);
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
  if (column !== 'cap') {
    const read = readWrittenDate(text);
    return read.fault === undefined ? { value: read.date } : read;
  }
  return /^\d{1,7}$/.test(text)
    ? { value: Number(text) }
    : { fault: `“${text}” is not a whole number in plain figures, for example 40.` };
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
