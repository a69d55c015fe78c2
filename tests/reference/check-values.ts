import { readFileSync } from 'node:fs';

/** One outside value, as `data/check-values.json` has it. */
export interface CheckValue<I, E> {
  id: string;
  source: string;
  inputs: I;
  expected: E;
}

const FOLDER = new URL('./data/', import.meta.url);

interface File {
  entries: CheckValue<unknown, unknown>[];
}

const { entries } = JSON.parse(readFileSync(new URL('check-values.json', FOLDER), 'utf8')) as File;

/** The entry of that name; the caller says what it holds. */
export function checkValue<I, E>(id: string): CheckValue<I, E> {
  const entry = entries.find((candidate) => candidate.id === id);
  if (!entry) throw new Error(`No outside value is called ${id}.`);
  return entry as CheckValue<I, E>;
}

/** All entries whose name starts so. */
export function checkValues<I, E>(start: string): CheckValue<I, E>[] {
  return entries.filter(({ id }) => id.startsWith(start)) as CheckValue<I, E>[];
}

/** Rows of a CSV file of `data/`, by the names in its first line. */
export function readCsv(name: string): Record<string, string>[] {
  const [head = '', ...lines] = readFileSync(new URL(name, FOLDER), 'utf8').trim().split(/\r?\n/);
  const names = head.split(',');
  return lines.map((line) => Object.fromEntries(line.split(',').map((value, place) => [names[place] ?? '', value])));
}
