import { isCalendarDate } from './schema';

/** Cross-checks work on whatever of the file can be read, so that one fault does not hide another. */
export type Members = Record<string, unknown>;

export const asMembers = (value: unknown): Members =>
  typeof value === 'object' && value !== null && !Array.isArray(value) ? (value as Members) : {};
export const asList = (value: unknown): unknown[] => (Array.isArray(value) ? value : []);
export const asText = (value: unknown): string | null => (typeof value === 'string' ? value : null);
export const asDate = (value: unknown): string | null =>
  typeof value === 'string' && isCalendarDate(value) ? value : null;
export const asCount = (value: unknown): number | null =>
  typeof value === 'number' && Number.isInteger(value) && value >= 0 ? value : null;

const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];

/** `14 Mar 2027`: dates in sentences are never ambiguous. */
export function dateWords(iso: string): string {
  return `${Number(iso.slice(8))} ${MONTHS[Number(iso.slice(5, 7)) - 1]} ${iso.slice(0, 4)}`;
}
