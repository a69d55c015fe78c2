import { tmpdir } from 'node:os';
import { basename, join } from 'node:path';
import { clusterFolder, makeDatabase, makeDataFolder, newPassword, startCluster } from './postgres.mjs';
import { run } from './run.mjs';
import { watch } from './watchman.mjs';

const TEMPLATE = 'kalends_template';

/** A throw-away cluster with one migrated database, from which each test file clones its own. */
export async function startTestCluster(folder) {
  makeDataFolder(folder);
  const unwatchFolder = watch({ folder });
  const place = await clusterFolder(folder, join(tmpdir(), `kalends-${basename(folder)}-postgres`));
  const unwatchPlace = watch({ folder: place });
  const passwords = { admin: newPassword(), owner: newPassword(), app: newPassword() };
  const cluster = await startCluster({ folder: place, passwords, durable: false });
  await makeDatabase(cluster, TEMPLATE);
  await migrate(cluster.ownerUrl(TEMPLATE), cluster.appUrl(TEMPLATE));
  return {
    cluster,
    place,
    env: {
      TEST_PG_ADMIN_URL: cluster.adminUrl,
      TEST_PG_OWNER_URL: cluster.ownerUrl(TEMPLATE),
      TEST_PG_APP_URL: cluster.appUrl(TEMPLATE),
    },
    stop: async () => {
      await cluster.stop();
      unwatchPlace();
      unwatchFolder();
    },
  };
}

export async function migrate(ownerUrl, appUrl) {
  await run(process.execPath, ['--import', 'tsx', 'scripts/migrate.ts'], {
    env: { DATABASE_OWNER_URL: ownerUrl, DATABASE_URL: appUrl },
  });
}
