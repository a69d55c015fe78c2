import { MikroORM } from '@mikro-orm/postgresql';
import { ormOptions } from '@/lib/db/config';
import { installQueues } from '@/lib/jobs/install';

/**
 * Brings the database to this version's schema, as the role that owns it. The product works as another role, plain; where
 * that is not kalends_app itself, it is made a member of it.
 */
const ownerUrl = process.env.DATABASE_OWNER_URL;
if (!ownerUrl) throw new Error('DATABASE_OWNER_URL is not set: migrations run as the role that owns the database.');

const orm = await MikroORM.init(ormOptions(ownerUrl));
try {
  const applied = await orm.migrator.up();
  const appUrl = process.env.DATABASE_URL;
  const appRole = appUrl ? decodeURIComponent(new URL(appUrl).username) : 'kalends_app';
  if (appRole !== 'kalends_app') {
    const quoted = appRole.replaceAll('"', '""');
    await orm.em.getConnection().execute(`grant kalends_app to "${quoted}"`);
  }
  console.log(
    applied.length === 0 ? 'The schema is up to date.' : `Applied: ${applied.map(({ name }) => name).join(', ')}`,
  );
} finally {
  await orm.close(true);
}
await installQueues(ownerUrl);
