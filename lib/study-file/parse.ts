import { parse as parseTolerantly, type ParseError } from 'jsonc-parser';
import { unsupportedParts } from '../engine/supported';
import type { Study } from '../engine/types';
import { eventFaults } from './event-checks';
import { plainWords, schemaFaults, type StudyFileFault } from './faults';
import { LIMITS } from './limits';
import { milestoneFaults } from './milestone-checks';
import { asMembers } from './readable';
import { studyFileSchema } from './schema';
import { siteFaults } from './site-checks';

export type ParsedStudyFile = { ok: true; study: Study } | { ok: false; errors: StudyFileFault[] };

const refused = (detail: string): ParsedStudyFile => ({ ok: false, errors: [{ pointer: '', detail }] });

/**
 * A study file out of its bytes or its text, or everything that is wrong with it at once.
 *
 * Bytes are UTF-8, with or without a byte order mark, 64 MB at most. Faults carry JSON Pointers (RFC 6901) to the member
 * itself and say what would be right. What the engine does not compute is refused here too, never ignored.
 */
export function parseStudyFile(input: Uint8Array | string): ParsedStudyFile {
  const text = typeof input === 'string' ? input : decode(input);
  if (typeof text !== 'string') return refused(text.detail);
  if (text.length > LIMITS.fileBytes) return refused('The file is larger than 64 MB.');
  let data: unknown;
  try {
    data = JSON.parse(text.startsWith('\uFEFF') ? text.slice(1) : text);
  } catch {
    return refused(notJson(text));
  }
  return checkStudy(data);
}

/** The same for data that are JSON already: a plan's preview in the browser, a run about to be queued. */
export function checkStudy(data: unknown): ParsedStudyFile {
  const parsed = studyFileSchema.safeParse(data, { error: plainWords });
  const members = asMembers(data);
  const errors = [
    ...(parsed.success ? [] : schemaFaults(parsed.error)),
    ...siteFaults(members),
    ...eventFaults(members),
    ...milestoneFaults(members),
    ...(parsed.success ? unsupportedParts(parsed.data) : []),
  ];
  // The same member may be found wanting twice; the first sentence, the schema's, is the plainer one.
  const known = new Set<string>();
  const once = errors.filter(({ pointer }) => !known.has(pointer) && known.add(pointer));
  return parsed.success && once.length === 0 ? { ok: true, study: parsed.data } : { ok: false, errors: once };
}

function decode(bytes: Uint8Array): string | { detail: string } {
  if (bytes.length > LIMITS.fileBytes) return { detail: 'The file is larger than 64 MB.' };
  if ((bytes[0] === 0xff && bytes[1] === 0xfe) || (bytes[0] === 0xfe && bytes[1] === 0xff)) {
    return { detail: 'The file is in UTF-16. Save it as UTF-8.' };
  }
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch {
    return { detail: 'The file is not in UTF-8. Save it as UTF-8.' };
  }
}

/** Where the text stops being JSON: the platform's own message does not always say. */
function notJson(text: string): string {
  if (text.trim() === '') return 'The file is empty. Give a study file as JSON.';
  const faults: ParseError[] = [];
  parseTolerantly(text, faults, { disallowComments: true });
  const before = text.slice(0, faults[0]?.offset ?? text.length);
  const line = before.split('\n').length;
  const column = before.length - before.lastIndexOf('\n');
  return `The file is not JSON: it stops making sense at line ${line}, column ${column}.`;
}
