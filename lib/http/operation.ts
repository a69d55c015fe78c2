import type { z } from 'zod';
import type { OrganisationAction, StudyAction } from '../auth/permissions';

/** What may call an operation: anybody, anybody signed in, an owner of the organisation, or a role of the study. */
export type Access =
  | { kind: 'public' }
  | { kind: 'person' }
  | { kind: 'organisation'; action: OrganisationAction }
  | { kind: 'study'; action: StudyAction };

/** An uploaded file, read into memory after its size was checked. */
export interface UploadedFile {
  name: string;
  bytes: Uint8Array;
}

/**
 * A route as a declaration: one object that the handler, the typed client and the documentation share.
 * `path` is written with braces, as in OpenAPI: `/api/v1/studies/{code}/sites`.
 */
export interface Operation<
  A extends Access = Access,
  P extends z.ZodType = z.ZodType,
  Q extends z.ZodType = z.ZodType,
  B extends z.ZodType = z.ZodType,
  R extends z.ZodType = z.ZodType,
> {
  method: 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';
  path: string;
  summary: string;
  access: A;
  params: P;
  query: Q;
  /** JSON body; with `upload` the body's fields travel beside the file in a form. */
  body: B;
  reply: R;
  /** The name of the form's file field, where one is uploaded. */
  upload?: 'file';
  /** The reply's status, 200 unless said. */
  status?: 200 | 201 | 202;
}

export type OperationInput<O extends Operation> = {
  params: z.infer<O['params']>;
  query: z.infer<O['query']>;
  body: z.infer<O['body']>;
} & (O['upload'] extends 'file' ? { file: UploadedFile } : unknown);

export type OperationReply<O extends Operation> = z.infer<O['reply']>;

/** Keeps the literal types of a declaration. */
export function defineOperation<
  const A extends Access,
  P extends z.ZodType,
  Q extends z.ZodType,
  B extends z.ZodType,
  R extends z.ZodType,
>(operation: Operation<A, P, Q, B, R>): Operation<A, P, Q, B, R> {
  return operation;
}

export function defineUpload<
  const A extends Access,
  P extends z.ZodType,
  Q extends z.ZodType,
  B extends z.ZodType,
  R extends z.ZodType,
>(operation: Operation<A, P, Q, B, R> & { upload: 'file' }): Operation<A, P, Q, B, R> & { upload: 'file' } {
  return operation;
}
