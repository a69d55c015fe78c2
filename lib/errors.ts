/** What can go wrong, in the domain's words. `lib/http/problem.ts` alone knows how each becomes a reply. */

export interface FieldFault {
  /** JSON Pointer (RFC 6901) into the input. */
  pointer: string;
  /** What is wrong and what would be right, as a sentence. */
  detail: string;
}

export abstract class KalendsError extends Error {
  abstract readonly kind: string;
}

/** The input can't be read at all. */
export class MalformedError extends KalendsError {
  readonly kind = 'malformed';
}

export class NotSignedInError extends KalendsError {
  readonly kind = 'not-signed-in';
  constructor() {
    super('Sign in to go on.');
  }
}

/** The person may know of the thing, but their role lacks the permission. */
export class ForbiddenError extends KalendsError {
  readonly kind = 'forbidden';
}

/** Not there, or another tenant's: the two are never told apart. */
export class NotFoundError extends KalendsError {
  readonly kind = 'not-found';
}

/** Invalid input or a broken rule: all faults at once. */
export class InvalidError extends KalendsError {
  readonly kind = 'invalid';
  constructor(
    readonly faults: FieldFault[],
    message = faults.length === 1 ? faults[0]!.detail : `${faults.length} things need to be put right.`,
  ) {
    super(message);
  }
}

/** Somebody else was there first. `current` shows what stands now, so that both values can be shown. */
export class ConflictError extends KalendsError {
  readonly kind = 'conflict';
  constructor(
    message: string,
    readonly current: unknown = null,
  ) {
    super(message);
  }
}

export class TooLargeError extends KalendsError {
  readonly kind = 'too-large';
}

export class WrongTypeError extends KalendsError {
  readonly kind = 'wrong-type';
}

export class TooManyError extends KalendsError {
  readonly kind = 'too-many';
  constructor(
    message: string,
    readonly retryAfterSeconds: number,
  ) {
    super(message);
  }
}
