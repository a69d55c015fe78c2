import { headers } from 'next/headers';
import { notFound, redirect } from 'next/navigation';
import type { EntityManager } from '@mikro-orm/postgresql';
import { findActor } from '../auth/actor';
import { authoriseOrganisation, authoriseStudy } from '../auth/authorise';
import type { OrganisationAction, StudyAction } from '../auth/permissions';
import type { Actor, OrganisationScope, StudyScope } from '../auth/scope';
import { transact } from '../db/transaction';
import { ForbiddenError, NotFoundError } from '../errors';

/** What a page gets instead of data when the person's role does not reach it. */
export interface NotPermitted {
  permitted: false;
  detail: string;
}

export type Permitted<T> = { permitted: true; data: T } | NotPermitted;

/** The signed-in person, or a redirect to sign in that leads back here. */
export async function pageActor(): Promise<Actor> {
  const list = await headers();
  const actor = await findActor(new Headers(list));
  if (!actor) redirect(`/sign-in?next=${encodeURIComponent(list.get('x-pathname') ?? '/studies')}`);
  return actor;
}

/** One read of a study's page: permission, then the query, in one transaction. An unknown study is a 404 page. */
export async function readStudy<A extends StudyAction, T>(
  code: string,
  action: A,
  query: (scope: StudyScope<A>, em: EntityManager) => Promise<T>,
): Promise<Permitted<T>> {
  const actor = await pageActor();
  return guarded(() =>
    transact({ personId: actor.personId }, async (em) => query(await authoriseStudy(em, actor, code, action), em)),
  );
}

export async function readOrganisation<A extends OrganisationAction, T>(
  action: A,
  query: (scope: OrganisationScope<A>, em: EntityManager) => Promise<T>,
): Promise<Permitted<T>> {
  const actor = await pageActor();
  return guarded(() =>
    transact({ personId: actor.personId }, async (em) => query(await authoriseOrganisation(em, actor, action), em)),
  );
}

async function guarded<T>(read: () => Promise<T>): Promise<Permitted<T>> {
  try {
    return { permitted: true, data: await read() };
  } catch (error) {
    if (error instanceof NotFoundError) notFound();
    if (error instanceof ForbiddenError) return { permitted: false, detail: error.message };
    throw error;
  }
}
