import { createHash } from 'node:crypto';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { clusterFolder, hasDatabase, makeDatabase, newPassword, sql, startCluster } from './postgres.mjs';

function readJson(file) {
  return existsSync(file) ? JSON.parse(readFileSync(file, 'utf8')) : {};
}

/** Passwords and keys that this machine makes up once and keeps, readable by their owner alone. */
export function readSecrets(data) {
  const file = join(data, 'secrets.json');
  const kept = readJson(file);
  const names = ['admin', 'owner', 'app', 'auth', 's3AccessKey', 's3SecretKey'];
  const secrets = Object.fromEntries(names.map((name) => [name, kept[name] ?? newPassword()]));
  if (names.some((name) => !kept[name])) writeFileSync(file, JSON.stringify(secrets, null, 2), { mode: 0o600 });
  return secrets;
}

const DATABASE = 'kalends';
const UNFINISHED = 'kalends_unfinished';

/**
 * The data folder's own database server. Its port is remembered, so that addresses noted down elsewhere stay true. A first
 * database is filled under another name and gets its own when it is complete, so that a start that was cut short is
 * begun again and not taken for done.
 */
export async function startOwnDatabase(data, secrets) {
  const note = join(data, 'cluster.json');
  const remembered = readJson(note);
  const hash = createHash('sha256').update(data).digest('hex').slice(0, 12);
  const folder = remembered.folder ?? (await clusterFolder(data, `/var/lib/kalends/${hash}`));
  const cluster = await startCluster({ folder, passwords: secrets, wishedPort: remembered.port });
  writeFileSync(note, JSON.stringify({ folder, port: cluster.port }, null, 2), { mode: 0o600 });
  const isFirst = !(await hasDatabase(cluster, DATABASE));
  if (isFirst) {
    await sql(cluster.adminUrl, `drop database if exists ${UNFINISHED} with (force)`);
    await makeDatabase(cluster, UNFINISHED);
  }
  const filled = isFirst ? UNFINISHED : DATABASE;
  return {
    cluster,
    appUrl: cluster.appUrl(DATABASE),
    filling: { DATABASE_URL: cluster.appUrl(filled), DATABASE_OWNER_URL: cluster.ownerUrl(filled) },
    finish: async () => {
      if (isFirst) await sql(cluster.adminUrl, `alter database ${UNFINISHED} rename to ${DATABASE}`);
    },
  };
}
