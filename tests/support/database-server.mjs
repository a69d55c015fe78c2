import { mkdirSync, rmSync } from 'node:fs';
import { resolve } from 'node:path';
import { startTestCluster } from '../../scripts/machine/test-cluster.mjs';

/**
 * Runs once before the tests that need PostgreSQL. `npm test` has started a server already; for a single file run by hand
 * one is started here and thrown away afterwards.
 */
export default async function setup() {
  if (process.env.TEST_PG_ADMIN_URL) return undefined;
  const folder = resolve('.data', `vitest-${process.pid}`);
  mkdirSync(folder, { recursive: true });
  const cluster = await startTestCluster(folder);
  Object.assign(process.env, cluster.env);
  return async () => {
    await cluster.stop();
    rmSync(folder, { recursive: true, force: true });
  };
}
