import type { EntityManager } from '@mikro-orm/postgresql';
import { getOrm } from './orm';

/** Who a transaction works for: row-level security reads it from the transaction's own settings. */
export interface Tenancy {
  organisationId?: string;
  personId?: string;
  invitationHash?: string;
}

/** Tells PostgreSQL whom the open transaction works for; local to the transaction, so that nothing leaks through the pool. */
export async function setTenancy(em: EntityManager, tenancy: Tenancy): Promise<void> {
  await em.execute(
    `select set_config('app.organisation_id', ?, true), set_config('app.person_id', ?, true), set_config('app.invitation_hash', ?, true)`,
    [tenancy.organisationId ?? '', tenancy.personId ?? '', tenancy.invitationHash ?? ''],
  );
}

/** The only place that opens transactions. Everything inside commits together or not at all. */
export async function transact<T>(tenancy: Tenancy, work: (em: EntityManager) => Promise<T>): Promise<T> {
  return getOrm()
    .em.fork()
    .transactional(async (em) => {
      const manager = em as EntityManager;
      await setTenancy(manager, tenancy);
      return work(manager);
    });
}
