import { formatLongMonth, formatMonth } from '@/lib/format';
import { LOG_FIELD_NAMES, LOG_FIELDS, type LogField, type MonthEntry } from '@/lib/site-log/schema';
import { isArmColumn } from '@/lib/study-file/arm-columns';
import { figureFault } from '@/components/site-log/sheet-figures';

export interface PasteOutcome {
  rows: number;
  columns: number;
  cells: { month: string; field: LogField; text: string }[];
  /** What was not taken, and why, cell by cell. */
  refused: string[];
}

type Target = LogField | 'month' | null;

/** Heads as other sheets write them. */
const OTHER_NAMES: Record<string, Target> = {
  month: 'month',
  'failed screening': 'failed',
  'screen failures': 'failed',
  'screen failed': 'failed',
  randomized: 'randomised',
  enrolled: 'randomised',
  event: 'events',
  'lost to follow-up': 'withdrawn',
  withdrawals: 'withdrawn',
};

function targetOf(head: string): Target {
  const name = head.trim().toLowerCase();
  return LOG_FIELDS.find((field) => field === name) ?? OTHER_NAMES[name] ?? null;
}

function isHead(cells: readonly string[]): boolean {
  return cells.some((cell) => targetOf(cell) !== null || isArmColumn(cell));
}

/**
 * A block from a spreadsheet, laid into the sheet from one cell to the right and down, month by month. A head over it is
 * understood; a column for treatment is never taken. Nothing that is saved already is overwritten.
 */
export function placePaste(
  text: string,
  at: { month: string; field: LogField },
  months: readonly MonthEntry[],
): PasteOutcome {
  const lines = text.replace(/(\r?\n|\r)+$/, '').split(/\r?\n|\r/); // prettier-ignore
  const block = lines.map((line) =>
    line.split(line.includes('\t') || !line.includes(';') ? '\t' : ';').map((cell) => cell.trim()),
  );
  const headed = isHead(block[0]!);
  const head = headed ? block.shift()! : [];
  const refused: string[] = [];
  const start = LOG_FIELDS.indexOf(at.field);
  const columns = Math.max(head.length, ...block.map((cells) => cells.length));
  const targets = Array.from({ length: columns }, (_, place): Target =>
    headed ? targetOf(head[place] ?? '') : (LOG_FIELDS[start + place] ?? null),
  );
  targets.forEach((target, place) => {
    if (target !== null) return;
    const name = head[place];
    if (name !== undefined && isArmColumn(name))
      refused.push(`Column ${place + 1}, “${name}”. Treatment is never stored here; leave that column out.`);
    else if (headed) refused.push(`Column ${place + 1}, “${name ?? ''}”, is not a column of this sheet.`);
    else refused.push(`Column ${place + 1} lies right of Withdrawn, the last column.`);
  });
  const outcome: PasteOutcome = { rows: block.length, columns, cells: [], refused };
  const firstRow = months.findIndex((entry) => entry.month === at.month);
  block.forEach((cells, place) => placeRow(outcome, cells, targets, months, firstRow + place));
  return outcome;
}

function placeRow(
  outcome: PasteOutcome,
  cells: readonly string[],
  targets: readonly Target[],
  months: readonly MonthEntry[],
  row: number,
): void {
  const monthPlace = targets.indexOf('month');
  const named = monthPlace >= 0 ? (cells[monthPlace] ?? '') : null;
  const entry = named === null ? months[row] : months.find(({ month }) => sameMonth(month, named));
  if (!entry) {
    if (cells.every((cell) => cell === '')) return;
    const last = formatLongMonth(months.at(-1)!.month);
    outcome.refused.push(
      named === null
        ? `A row below ${last}: that month can’t be logged yet.`
        : `“${named}” is not a month of this sheet.`,
    );
    return;
  }
  targets.forEach((field, place) => {
    const text = cells[place] ?? '';
    if (field === null || field === 'month' || text === '') return;
    const where = `${formatLongMonth(entry.month)}, ${LOG_FIELD_NAMES[field]}`;
    const fault = figureFault(text);
    if (fault) outcome.refused.push(`${where}: ${fault}`);
    else if (entry[field] === null) outcome.cells.push({ month: entry.month, field, text: String(Number(text)) });
    else if (entry[field] !== Number(text))
      outcome.refused.push(`${where}: ${text}. It is saved as ${entry[field]}; correct it, with a reason.`);
  });
}

/** `2027-03`, `Mar 2027` or `March 2027`. */
function sameMonth(month: string, text: string): boolean {
  return [month, formatMonth(month).toLowerCase(), formatLongMonth(month).toLowerCase()].includes(text.toLowerCase());
}
