import { execFile } from 'node:child_process';
import { randomUUID } from 'node:crypto';
import { setTimeout as wait } from 'node:timers/promises';
import { promisify } from 'node:util';

export interface TestDatabase {
  name: string;
  /** The plain role, as the product works. */
  appUrl: string;
  /** The role that owns and migrates. */
  ownerUrl: string;
  drop: () => Promise<void>;
}

const setting = (name: string): string => {
  const value = process.env[name];
  if (!value) throw new Error(`${name} is not set: this test belongs to a folder that vitest.config.ts calls pure.`);
  return value;
};

const inDatabase = (url: string, name: string): string => {
  const changed = new URL(url);
  changed.pathname = `/${name}`;
  return changed.href;
};

/** Statements as PostgreSQL's superuser, for what only it may do: clone, drop, end connections. */
export async function asAdmin(statement: string, database = 'postgres'): Promise<string> {
  const url = new URL(inDatabase(setting('TEST_PG_ADMIN_URL'), database));
  const env = { ...process.env, PGPASSWORD: url.password };
  const args = [
    '-X',
    '-q',
    '-t',
    '-A',
    '-v',
    'ON_ERROR_STOP=1',
    '-h',
    url.hostname,
    '-p',
    url.port,
    '-U',
    url.username,
  ];
  const { stdout } = await promisify(execFile)('psql', [...args, '-d', database, '-c', statement], { env });
  return stdout.trim();
}

/** A database of one's own, cloned from the migrated template within a fraction of a second. */
export async function createTestDatabase(label = 'test'): Promise<TestDatabase> {
  const template = new URL(setting('TEST_PG_OWNER_URL')).pathname.slice(1);
  const name = `${label.toLowerCase().replace(/[^a-z0-9]+/g, '_')}_${randomUUID().slice(0, 8)}`;
  for (let attempt = 1; ; attempt += 1) {
    try {
      await asAdmin(`create database ${name} template ${template} owner kalends_owner`);
      break;
    } catch (error) {
      // Another file may be cloning the same template at this instant.
      if (attempt === 20 || !String(error).includes('is being accessed')) throw error;
      await wait(100);
    }
  }
  return {
    name,
    appUrl: inDatabase(setting('TEST_PG_APP_URL'), name),
    ownerUrl: inDatabase(setting('TEST_PG_OWNER_URL'), name),
    drop: async () => {
      await asAdmin(`drop database if exists ${name} with (force)`);
    },
  };
}
