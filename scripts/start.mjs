import { existsSync, readFileSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { buildWeb, buildWorker, isBuilt } from './machine/build.mjs';
import { readSecrets, startOwnDatabase } from './machine/data-folder.mjs';
import { atTheEnd, end, live } from './machine/lifecycle.mjs';
import { lock } from './machine/lock.mjs';
import { ensureNodeModules } from './machine/node-modules.mjs';
import { reservePort } from './machine/port.mjs';
import { makeDataFolder } from './machine/postgres.mjs';
import { run } from './machine/run.mjs';
import { explain, Refusal, say } from './machine/speak.mjs';
import { startLocalServers, startProduct } from './machine/stack.mjs';

/**
 * `npm start`: from a fresh checkout to a running product. Everything that it makes is in the data folder, everything that
 * it starts is on loopback and ends with it.
 *
 * A PostgreSQL of your own is used when both of its addresses are given: DATABASE_URL, the plain role that the product
 * works as, and DATABASE_OWNER_URL, the role that owns the database and migrates. Two, because row-level security does
 * not bind an owner who may switch it off.
 */
async function main() {
  process.chdir(resolve(import.meta.dirname, '..'));
  const data = resolve(process.env.KALENDS_DATA ?? '.data');
  const logs = join(data, 'logs');
  makeDataFolder(data);
  atTheEnd(lock(join(data, 'start.lock'), 'Kalends'));
  const reserved = await choosePort();
  await ensureNodeModules();
  const secrets = readSecrets(data);
  const database = await openDatabase(data, secrets);
  const local = await startLocalServers({ data, logs, secrets });
  const env = {
    NODE_ENV: 'production',
    NEXT_TELEMETRY_DISABLED: '1',
    AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED: 'true',
    PORT: String(reserved.port),
    KALENDS_DATA: data,
    KALENDS_DEMONSTRATION: isDemonstration() ? '1' : '0',
    DATABASE_URL: database.appUrl,
    // Whoever works as the plain role is not given the other one's password.
    DATABASE_OWNER_URL: '',
    BETTER_AUTH_SECRET: process.env.BETTER_AUTH_SECRET || secrets.auth,
    ...local,
  };
  await prepare(env, database);
  say('Starting the web server and the queue worker');
  const address = await startProduct({ env, reserved, logs });
  announce(process.env.KALENDS_URL ?? address, data);
}

/** Kept from now on, because the build that comes before the web server takes a while. */
async function choosePort() {
  const wished = Number(process.env.PORT || 3000);
  if (!Number.isInteger(wished) || wished < 1 || wished > 65_535) {
    throw new Refusal('PORT has to be a number from 1 to 65535.');
  }
  const last = process.env.PORT ? wished : Math.min(wished + 100, 65_535);
  for (let port = wished; port <= last; port += 1) {
    const reserved = await reservePort(port);
    if (reserved) return reserved;
  }
  throw new Refusal(`Port ${wished} is taken. Choose another with PORT, or leave PORT out.`);
}

const isDemonstration = () => {
  if (process.env.KALENDS_DEMONSTRATION) return process.env.KALENDS_DEMONSTRATION === '1';
  return !process.env.KALENDS_URL || /^http:\/\/(127\.0\.0\.1|localhost)(:|\/|$)/.test(process.env.KALENDS_URL);
};

async function openDatabase(data, secrets) {
  const { DATABASE_URL: appUrl, DATABASE_OWNER_URL: ownerUrl } = process.env;
  if (appUrl && ownerUrl) {
    return { appUrl, filling: { DATABASE_URL: appUrl, DATABASE_OWNER_URL: ownerUrl }, finish: async () => {} };
  }
  if (appUrl || ownerUrl) {
    throw new Refusal(
      'A database of your own needs both DATABASE_URL (the plain role) and DATABASE_OWNER_URL (the owning role).',
    );
  }
  say('Starting the database');
  const { cluster, ...database } = await startOwnDatabase(data, secrets);
  atTheEnd(cluster.stop);
  cluster.supervise((error) => {
    explain(error);
    void end(1);
  });
  return database;
}

/** Schema, demonstration and build; the build beside the other two, because only it takes long. */
async function prepare(env, { filling, finish }) {
  const built = isBuilt();
  if (!built) await buildWorker();
  const fill = fillDatabase({ ...env, ...filling }).then(finish);
  await Promise.all([fill, built ? undefined : buildWeb(env)]);
}

async function fillDatabase(env) {
  say('Bringing the database to this version');
  await run(process.execPath, ['--import', 'tsx', 'scripts/migrate.ts'], { env });
  if (env.KALENDS_DEMONSTRATION !== '1') return;
  say('Filling in the demonstration where the database is empty');
  await run(process.execPath, ['--import', 'tsx', 'scripts/seed.ts'], { env });
}

function announce(address, data) {
  const file = join(data, 'demo-accounts.json');
  const accounts = existsSync(file) ? JSON.parse(readFileSync(file, 'utf8')) : [];
  const lines = accounts.map(({ name, role, email, password }) => [`${name}, ${role}`, email, password]);
  const widths = [0, 1].map((column) => Math.max(0, ...lines.map((line) => line[column].length)));
  say(`Ready. Logs are in ${join(data, 'logs')}. Ctrl-C stops everything.`);
  console.log(`\n  Kalends is at ${address}\n`);
  if (lines.length === 0) return;
  console.log('  Accounts of the demonstration, all of it invented (person, e-mail, password):');
  for (const [who, email, password] of lines) {
    console.log(`    ${who.padEnd(widths[0])}  ${email.padEnd(widths[1])}  ${password}`);
  }
  console.log(`\n  Mail that it sends: ${address}/dev/mailbox\n`);
}

await live(main);
