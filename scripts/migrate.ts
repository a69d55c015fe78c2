import { MikroORM } from '@mikro-orm/postgresql';
import { ormOptions } from '@/lib/db/config';
import { installQueues } from '@/lib/jobs/install';

/** What whoever set up the roles has to put right: said in one line. */
class Refusal extends Error {}

const PLAIN_ROLE = 'kalends_app';

interface RoleRow {
  powerful: boolean;
  member: boolean;
}

/** The role that the product works as has to be bound by row-level security, and to hold what the migrations grant. */
async function prepareAppRole(orm: MikroORM, appRole: string): Promise<void> {
  const connection = orm.em.getConnection();
  const quoted = appRole.replaceAll('"', '""');
  const [role]: RoleRow[] = await connection.execute(
    `select rolsuper or rolbypassrls as powerful, pg_has_role(rolname, ?, 'member') as member from pg_roles where rolname = ?`,
    [PLAIN_ROLE, appRole],
  );
  if (!role) throw new Refusal(`DATABASE_URL names the role ${appRole}, which this server does not have.`);
  if (role.powerful) {
    throw new Refusal(
      `DATABASE_URL names the role ${appRole}, which row-level security does not bind: take a plain one.`,
    );
  }
  if (role.member) return;
  try {
    await connection.execute(`grant ${PLAIN_ROLE} to "${quoted}"`);
  } catch {
    throw new Refusal(`As the server’s administrator, run once: grant ${PLAIN_ROLE} to "${quoted}"`);
  }
}

async function ensurePlainRole(orm: MikroORM): Promise<void> {
  const connection = orm.em.getConnection();
  const found: unknown[] = await connection.execute('select 1 from pg_roles where rolname = ?', [PLAIN_ROLE]);
  if (found.length > 0) return;
  try {
    await connection.execute(`create role ${PLAIN_ROLE} nologin`);
  } catch {
    throw new Refusal(`As the server’s administrator, run once: create role ${PLAIN_ROLE} nologin`);
  }
}

/**
 * Brings the database to this version's schema, as the role that owns it. The product works as another role, plain; where
 * that is not kalends_app itself, it is made a member of it.
 */
async function migrate(): Promise<void> {
  const { DATABASE_OWNER_URL: ownerUrl, DATABASE_URL: appUrl } = process.env;
  if (!ownerUrl) throw new Refusal('DATABASE_OWNER_URL is not set: migrations run as the role that owns the database.');
  const orm = await MikroORM.init(ormOptions(ownerUrl));
  try {
    await ensurePlainRole(orm);
    if (appUrl) await prepareAppRole(orm, decodeURIComponent(new URL(appUrl).username));
    const applied = await orm.migrator.up();
    const names = applied.map(({ name }) => name).join(', ');
    console.log(names ? `Applied: ${names}` : 'The schema is up to date.');
  } finally {
    await orm.close(true);
  }
  await installQueues(ownerUrl);
}

try {
  await migrate();
} catch (error) {
  console.error(error instanceof Refusal ? error.message : error);
  process.exitCode = 1;
}
