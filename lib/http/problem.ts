import { OptimisticLockError, UniqueConstraintViolationException } from '@mikro-orm/core';
import type { z } from 'zod';
import {
  ConflictError,
  type FieldFault,
  ForbiddenError,
  InvalidError,
  KalendsError,
  MalformedError,
  NotFoundError,
  NotSignedInError,
  TooLargeError,
  TooManyError,
  WrongTypeError,
} from '../errors';
import { log } from '../log';

/** RFC 9457 problem details, with what a form needs to show every fault beside its field. */
export interface Problem {
  type: 'about:blank';
  title: string;
  status: number;
  detail: string;
  requestId: string;
  errors?: FieldFault[];
  /** On 409: what stands now, so that both values can be shown. */
  current?: unknown;
}

const TITLES: Record<number, string> = {
  400: 'Not readable',
  401: 'Not signed in',
  403: 'Not permitted',
  404: 'Not found',
  409: 'Changed meanwhile',
  413: 'Too large',
  415: 'Wrong type',
  422: 'Not valid',
  429: 'Too many requests',
  500: 'Something went wrong',
};

function statusOf(error: unknown): number {
  if (error instanceof MalformedError) return 400;
  if (error instanceof NotSignedInError) return 401;
  if (error instanceof ForbiddenError) return 403;
  if (error instanceof NotFoundError) return 404;
  if (
    error instanceof ConflictError ||
    error instanceof OptimisticLockError ||
    error instanceof UniqueConstraintViolationException
  )
    return 409;
  if (error instanceof TooLargeError) return 413;
  if (error instanceof WrongTypeError) return 415;
  if (error instanceof InvalidError) return 422;
  if (error instanceof TooManyError) return 429;
  return 500;
}

function detailOf(error: unknown, status: number): string {
  if (error instanceof KalendsError) return error.message;
  if (status === 409)
    return 'Someone else saved this while you were working on it. Load it again to see what stands now.';
  return 'The request could not be carried out. Nothing was saved. Try again; if it happens again, quote the request number.';
}

/** The one place where an error becomes a reply. What is not ours to explain is logged and answered in general words. */
export function problemResponse(error: unknown, requestId: string): Response {
  const status = statusOf(error);
  if (status === 500) log.error({ err: error, requestId }, 'request failed');
  const problem: Problem = {
    type: 'about:blank',
    title: TITLES[status]!,
    status,
    detail: detailOf(error, status),
    requestId,
    ...(error instanceof InvalidError ? { errors: error.faults } : {}),
    ...(error instanceof ConflictError && error.current !== null ? { current: error.current } : {}),
  };
  const headers = new Headers({
    'content-type': 'application/problem+json',
    'cache-control': 'no-store',
    'x-request-id': requestId,
  });
  if (error instanceof TooManyError) headers.set('retry-after', String(error.retryAfterSeconds));
  return new Response(JSON.stringify(problem), { status, headers });
}

const escapePointer = (part: PropertyKey): string => String(part).replaceAll('~', '~0').replaceAll('/', '~1');

/** zod's issues as faults with JSON Pointers; an unknown member is named itself. */
export function faultsOf(error: z.ZodError, prefix = ''): FieldFault[] {
  return error.issues.flatMap((issue) => {
    const base = prefix + issue.path.map((part) => `/${escapePointer(part)}`).join('');
    if (issue.code === 'unrecognized_keys') {
      return issue.keys.map((key) => ({
        pointer: `${base}/${escapePointer(key)}`,
        detail: `There is no field called ${key} here. Leave it out.`,
      }));
    }
    return [{ pointer: base, detail: issue.message }];
  });
}
