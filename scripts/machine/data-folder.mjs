import { createHash } from 'node:crypto';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { clusterFolder, ensureDatabase, newPassword, startCluster } from './postgres.mjs';

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

/** The data folder's own database server. Its port is remembered, so that addresses noted down elsewhere stay true. */
export async function startOwnDatabase(data, secrets) {
  const note = join(data, 'cluster.json');
  const remembered = readJson(note);
  const hash = createHash('sha256').update(data).digest('hex').slice(0, 12);
  const folder = remembered.folder ?? (await clusterFolder(data, `/var/lib/kalends/${hash}`));
  const cluster = await startCluster({ folder, passwords: secrets, wishedPort: remembered.port });
  writeFileSync(note, JSON.stringify({ folder, port: cluster.port }, null, 2), { mode: 0o600 });
  await ensureDatabase(cluster, DATABASE);
  return { appUrl: cluster.appUrl(DATABASE), ownerUrl: cluster.ownerUrl(DATABASE), cluster };
}
