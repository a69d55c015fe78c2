import type { z } from 'zod';
import { BLINDING_SENTENCE, isArmColumn } from './arm-columns';

/** One thing that is wrong: a JSON Pointer (RFC 6901) to the member itself, and a sentence that says what would be right. */
export interface StudyFileFault {
  pointer: string;
  detail: string;
}

const escapePart = (part: PropertyKey): string => String(part).replaceAll('~', '~0').replaceAll('/', '~1');

/** `['enrolment', 'sites', 3]` -> `/enrolment/sites/3`. */
export function pointerOf(path: readonly PropertyKey[]): string {
  return path.map((part) => `/${escapePart(part)}`).join('');
}

function unknownMember(name: string): string {
  if (isArmColumn(name)) return `“${name}” carries treatment. ${BLINDING_SENTENCE} Leave it out.`;
  return `There is no field called “${name}” here. Leave it out, or check its spelling.`;
}

/** The schema's issues as faults; an unknown member is named itself. */
export function schemaFaults(error: z.ZodError): StudyFileFault[] {
  return error.issues.flatMap((issue) => {
    if (issue.code === 'unrecognized_keys') {
      return issue.keys.map((key) => ({ pointer: pointerOf([...issue.path, key]), detail: unknownMember(key) }));
    }
    return [{ pointer: pointerOf(issue.path), detail: issue.message }];
  });
}

const KINDS: Record<string, string> = {
  string: 'text',
  number: 'a number',
  int: 'a whole number',
  boolean: 'true or false',
  array: 'a list',
  object: 'an object',
  record: 'an object',
};

/** Plain words for what a schema expected. A message that a field brings itself comes before these. */
export const plainWords: z.core.$ZodErrorMap = (issue) => {
  switch (issue.code) {
    case 'invalid_type': {
      const wanted = KINDS[issue.expected] ?? issue.expected;
      if (issue.input === undefined) return `This is missing. Give ${wanted}.`;
      return typeof issue.input === 'number' && !Number.isFinite(issue.input)
        ? 'Give a finite number.'
        : `Give ${wanted}, not ${wordFor(issue.input)}.`;
    }
    case 'too_small':
      if (issue.origin === 'array') return `Give at least ${issue.minimum} here.`;
      if (issue.origin === 'string') return 'Give some text here; it is empty.';
      return issue.inclusive ? `Give ${bound(issue.minimum)} or more.` : `Give a number above ${bound(issue.minimum)}.`;
    case 'too_big':
      if (issue.origin === 'array') return `Give at most ${bound(issue.maximum)} here.`;
      if (issue.origin === 'string') return `Give at most ${bound(issue.maximum)} characters.`;
      return issue.inclusive ? `Give ${bound(issue.maximum)} or less.` : `Give a number below ${bound(issue.maximum)}.`;
    case 'invalid_value':
      if (issue.input === undefined) return `This is missing. Give ${alternatives(issue.values)}.`;
      return `Give ${alternatives(issue.values)}.`;
    case 'not_multiple_of':
      return 'Give a whole number.';
    default:
      return undefined;
  }
};

const bound = (value: number | bigint): string => Number(value).toLocaleString('en-GB', { maximumFractionDigits: 4 });

function alternatives(values: readonly unknown[]): string {
  const named = values.map((value) => `“${String(value)}”`);
  return named.length === 1 ? named[0]! : `${named.slice(0, -1).join(', ')} or ${named.at(-1)}`;
}

function wordFor(input: unknown): string {
  if (input === null) return 'null';
  if (Array.isArray(input)) return 'a list';
  return typeof input === 'object' ? 'an object' : typeof input === 'string' ? 'text' : String(input);
}
