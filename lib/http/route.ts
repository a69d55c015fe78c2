import { randomUUID } from 'node:crypto';
import type { z } from 'zod';
import type { CommandContext } from '../audit/record';
import { findActor } from '../auth/actor';
import { authoriseOrganisation, authoriseStudy } from '../auth/authorise';
import type { OrganisationAction, StudyAction } from '../auth/permissions';
import type { Actor, OrganisationScope, PersonScope, StudyScope } from '../auth/scope';
import { systemClock } from '../clock';
import { transact } from '../db/transaction';
import { env } from '../env';
import { InvalidError, MalformedError, NotSignedInError } from '../errors';
import type { EntityManager } from '@mikro-orm/postgresql';
import { readBody } from './body';
import type { Access, Operation, OperationInput, OperationReply } from './operation';
import { faultsOf, problemResponse } from './problem';

type ScopeOf<A extends Access> = A extends { kind: 'study'; action: infer S extends StudyAction }
  ? StudyScope<S>
  : A extends { kind: 'organisation'; action: infer G extends OrganisationAction }
    ? OrganisationScope<G>
    : A extends { kind: 'person' }
      ? PersonScope
      : null;

export type Handler<O extends Operation> = (
  scope: ScopeOf<O['access']>,
  input: OperationInput<O>,
  context: CommandContext,
) => Promise<OperationReply<O> | Response>;

type RouteContext = { params: Promise<Record<string, string | string[] | undefined>> };

/**
 * A route handler out of a declaration and a command or query. Everything that routes share happens here and only here:
 * origin check, actor, permission, parsing, transaction, reply check, errors.
 */
export function route<O extends Operation>(operation: O, handler: Handler<O>) {
  return async (request: Request, routeContext?: RouteContext): Promise<Response> => {
    const requestId = randomUUID();
    try {
      refuseForeignOrigin(operation, request);
      const actor = operation.access.kind === 'public' ? null : await findActor(request.headers);
      if (operation.access.kind !== 'public' && !actor) throw new NotSignedInError();
      const params = await readParams(operation, routeContext);
      const reply = await transact({ personId: actor?.personId }, async (em) => {
        const scope = await makeScope(em, operation.access, actor, params);
        const input = await readInput(operation, request, params);
        const context: CommandContext = {
          em,
          clock: systemClock,
          requestId,
          source: operation.upload ? 'upload' : 'screen',
        };
        return handler(scope as ScopeOf<O['access']>, input as OperationInput<O>, context);
      });
      return reply instanceof Response ? withRequestId(reply, requestId) : jsonReply(operation, reply, requestId);
    } catch (error) {
      return problemResponse(error, requestId);
    }
  };
}

/** A change has to come from our own pages: other sites' forms and scripts carry another Origin. */
function refuseForeignOrigin(operation: Operation, request: Request): void {
  if (operation.method === 'GET') return;
  const origin = request.headers.get('origin');
  const site = request.headers.get('sec-fetch-site');
  const known = origin !== null && env().trustedOrigins.includes(origin);
  if ((origin !== null && !known) || (origin === null && site !== null && site !== 'same-origin' && site !== 'none')) {
    throw new MalformedError('This request came from another site and was not carried out.');
  }
}

async function readParams(operation: Operation, routeContext: RouteContext | undefined): Promise<unknown> {
  const parsed = operation.params.safeParse((await routeContext?.params) ?? {});
  if (!parsed.success) throw new MalformedError('The address of this request is not one that exists.');
  return parsed.data;
}

async function makeScope(em: EntityManager, access: Access, actor: Actor | null, params: unknown): Promise<unknown> {
  if (access.kind === 'public' || !actor) return null;
  if (access.kind === 'person') return { actor } satisfies PersonScope;
  if (access.kind === 'organisation') return authoriseOrganisation(em, actor, access.action);
  return authoriseStudy(em, actor, (params as { code: string }).code, access.action);
}

async function readInput(operation: Operation, request: Request, params: unknown): Promise<unknown> {
  const query = operation.query.safeParse(Object.fromEntries(new URL(request.url).searchParams));
  const { body: raw, file } = await readBody(operation, request);
  const body = operation.body.safeParse(raw);
  const faults = [...(query.success ? [] : faultsOf(query.error)), ...(body.success ? [] : faultsOf(body.error))];
  if (faults.length > 0) throw new InvalidError(faults);
  return { params, query: query.data, body: body.data, ...(file ? { file } : {}) };
}

function jsonReply(operation: Operation, reply: unknown, requestId: string): Response {
  const checked = (operation.reply as z.ZodType).parse(reply);
  return new Response(JSON.stringify(checked), {
    status: operation.status ?? 200,
    headers: { 'content-type': 'application/json', 'cache-control': 'no-store', 'x-request-id': requestId },
  });
}

function withRequestId(response: Response, requestId: string): Response {
  response.headers.set('x-request-id', requestId);
  if (!response.headers.has('cache-control')) response.headers.set('cache-control', 'no-store');
  return response;
}
