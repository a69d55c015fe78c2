import { afterAll, afterEach, expect } from 'vitest';
import { createTestDatabase } from './database';

/**
 * Each test file works on a clone of the migrated database, through the product's own ORM. The clone is dropped
 * afterwards, and kept when a test has failed.
 */
const file =
  expect
    .getState()
    .testPath?.split('/')
    .pop()
    ?.replace(/\.test\.tsx?$/, '') ?? 'test';
const database = await createTestDatabase(file);
process.env.DATABASE_URL = database.appUrl;
process.env.DATABASE_OWNER_URL = database.ownerUrl;
// Every test signs in, from one address; the limit is tested where a test asks for it.
process.env.KALENDS_SIGN_IN_ATTEMPTS ??= '10000';

let failed = false;

afterEach(({ task }) => {
  failed ||= task.result?.state === 'fail';
});

afterAll(async () => {
  const { closeOrm } = await import('@/lib/db/orm');
  await closeOrm();
  if (!failed) await database.drop();
});
