import type { CommandContext } from '@/lib/audit/record';
import { authoriseOrganisation, authoriseStudy } from '@/lib/auth/authorise';
import type { OrganisationAction, StudyAction } from '@/lib/auth/permissions';
import type { Actor, OrganisationScope, StudyScope } from '@/lib/auth/scope';
import { fixedClock } from '@/lib/clock';
import { transact } from '@/lib/db/transaction';

/** One act of one person at one instant of the invented past: through the same permission check and command as a user's. */
export async function act<A extends StudyAction, T>(
  actor: Actor,
  code: string,
  action: A,
  at: string,
  work: (scope: StudyScope<A>, context: CommandContext) => Promise<T>,
): Promise<T> {
  return transact({ personId: actor.personId }, async (em) =>
    work(await authoriseStudy(em, actor, code, action), {
      em,
      clock: fixedClock(at),
      requestId: null,
      source: 'screen',
    }),
  );
}

export async function actAsOwner<A extends OrganisationAction, T>(
  actor: Actor,
  action: A,
  at: string,
  work: (scope: OrganisationScope<A>, context: CommandContext) => Promise<T>,
): Promise<T> {
  return transact({ personId: actor.personId }, async (em) =>
    work(await authoriseOrganisation(em, actor, action), {
      em,
      clock: fixedClock(at),
      requestId: null,
      source: 'screen',
    }),
  );
}
