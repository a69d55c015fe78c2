import type { z } from 'zod';
import type { Operation, OperationReply } from './operation';
import type { Problem } from './problem';

/** A refused request, with everything a form needs to say what would be right. */
export class ProblemError extends Error {
  constructor(readonly problem: Problem) {
    super(problem.detail);
  }

  /** The faults by pointer, for fields. */
  fault(pointer: string): string | undefined {
    return this.problem.errors?.find((error) => error.pointer === pointer)?.detail;
  }
}

/** The line dropped: nothing is known about whether the request arrived. */
export class OfflineError extends Error {
  constructor() {
    super('The server can’t be reached. Nothing was sent; what you typed is kept on this device.');
  }
}

export type CallInput<O extends Operation> = {
  params: z.input<O['params']>;
  query?: z.input<O['query']>;
  body?: z.input<O['body']>;
  signal?: AbortSignal;
} & (O['upload'] extends 'file' ? { file: File } : unknown);

/** Calls an operation from the browser; the reply is typed by its declaration. */
export async function callOperation<O extends Operation>(
  operation: O,
  input: CallInput<O>,
): Promise<OperationReply<O>> {
  const file = (input as { file?: File }).file;
  let response: Response;
  try {
    response = await fetch(addressOf(operation, input.params, input.query), {
      method: operation.method,
      headers: file || operation.method === 'GET' ? {} : { 'content-type': 'application/json' },
      body:
        operation.method === 'GET' || operation.method === 'DELETE'
          ? undefined
          : file
            ? formOf(file, input.body)
            : JSON.stringify(input.body ?? {}),
      signal: input.signal,
      credentials: 'same-origin',
    });
  } catch (error) {
    if (input.signal?.aborted) throw error;
    throw new OfflineError();
  }
  if (!response.ok) throw new ProblemError(await problemOf(response));
  return (await response.json()) as OperationReply<O>;
}

export function addressOf(operation: Operation, params: unknown, query?: unknown): string {
  const path = operation.path.replace(/\{(\w+)\}/g, (_, name: string) =>
    encodeURIComponent(String((params as Record<string, unknown>)[name])),
  );
  const search = new URLSearchParams(
    Object.entries((query ?? {}) as Record<string, unknown>).flatMap(([key, value]) =>
      value === undefined || value === null ? [] : [[key, String(value)]],
    ),
  ).toString();
  return search ? `${path}?${search}` : path;
}

function formOf(file: File, body: unknown): FormData {
  const form = new FormData();
  form.set('file', file);
  for (const [key, value] of Object.entries((body ?? {}) as Record<string, unknown>)) {
    if (value !== undefined && value !== null) form.set(key, typeof value === 'string' ? value : JSON.stringify(value));
  }
  return form;
}

async function problemOf(response: Response): Promise<Problem> {
  try {
    return (await response.json()) as Problem;
  } catch {
    return {
      type: 'about:blank',
      title: 'Something went wrong',
      status: response.status,
      detail: 'The server did not answer as expected. Try again.',
      requestId: '',
    };
  }
}
