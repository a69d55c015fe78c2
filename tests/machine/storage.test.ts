import { randomBytes } from 'node:crypto';
import { readdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { getFile, putFile } from '@/lib/storage';
import { type LocalServer, startLocalServer } from './local-servers';

let store: LocalServer;
const keys = { S3_ACCESS_KEY: 'access-of-this-test', S3_SECRET_KEY: 'secret-of-this-test' };

beforeAll(async () => {
  store = await startLocalServer('local-files', (folder) => ({ ...keys, KALENDS_FILES_FOLDER: folder }));
  Object.assign(process.env, keys, { S3_ENDPOINT: `http://127.0.0.1:${store.port}`, S3_BUCKET: 'kept' });
});
afterAll(() => store.stop());

describe('the file store', () => {
  it('gives back what it was given, byte for byte, and makes its bucket', async () => {
    const body = randomBytes(300_000);
    const stored = await putFile('cuts/a/upload.csv', body, 'text/csv');
    expect(stored.size).toBe(300_000);
    expect(stored.sha256).toMatch(/^[0-9a-f]{64}$/);
    expect(Buffer.from(await getFile(stored.key, stored.sha256)).equals(body)).toBe(true);
  });

  it('takes several files at once into a bucket that is not there yet', async () => {
    const files = await Promise.all(
      Array.from({ length: 8 }, (_, index) => putFile(`many/${index}`, Buffer.from(`file ${index}`), 'text/plain')),
    );
    const bodies = await Promise.all(files.map(({ key, sha256 }) => getFile(key, sha256)));
    expect(bodies.map((body) => Buffer.from(body).toString())).toEqual(files.map((_, index) => `file ${index}`));
  });

  it('refuses bytes that are not those which were recorded', async () => {
    const stored = await putFile('changed', Buffer.from('as it was'), 'text/plain');
    const [object] = readdirSync(join(store.folder, 'kept')).filter((name) =>
      name.startsWith('changed._S3rver_object'),
    );
    writeFileSync(join(store.folder, 'kept', object ?? ''), 'as it is');
    await expect(getFile(stored.key, stored.sha256)).rejects.toThrow('SHA-256');
  });

  it('says so when a file is not there', async () => {
    await expect(getFile('nowhere', '0'.repeat(64))).rejects.toThrow();
  });

  it('lets nobody in without this machine’s keys', async () => {
    const anonymous = await fetch(`http://127.0.0.1:${store.port}/kept/changed`);
    expect(anonymous.status).toBe(403);
  });
});
