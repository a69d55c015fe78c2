import { existsSync, readFileSync, rmSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { buildWeb, buildWorker, isBuilt } from './machine/build.mjs';
import { runChecks } from './machine/checks.mjs';
import { readSecrets } from './machine/data-folder.mjs';
import { CHROMIUM, ensureChromium } from './machine/debian.mjs';
import { atTheEnd, live } from './machine/lifecycle.mjs';
import { isLocked, lock } from './machine/lock.mjs';
import { ensureNodeModules } from './machine/node-modules.mjs';
import { reservePort } from './machine/port.mjs';
import { makeDatabase, makeDataFolder } from './machine/postgres.mjs';
import { run } from './machine/run.mjs';
import { Refusal, say } from './machine/speak.mjs';
import { startLocalServers, startProduct } from './machine/stack.mjs';
import { migrate, startTestCluster } from './machine/test-cluster.mjs';

/**
 * `npm test [-- check|unit|e2e [arguments of vitest or Playwright]]`: everything, or parts of it, on a database server
 * that is thrown away afterwards. The last line is the sum: `N passed, N failed`.
 */
const PARTS = ['check', 'unit', 'e2e'];
const given = process.argv.slice(2);
const parts = given.some((word) => PARTS.includes(word)) ? PARTS.filter((part) => given.includes(part)) : PARTS;
const passedOn = given.filter((word) => !PARTS.includes(word));

const data = resolve(import.meta.dirname, '../.data');
const folder = join(data, 'test');
const total = { passed: 0, failed: 0, finished: false };

function count({ passed, failed }) {
  total.passed += passed;
  total.failed += failed;
}

async function main() {
  // Registered first, so that it is said last, however this ends.
  atTheEnd(() => {
    if (!total.finished) total.failed += 1;
    console.log(`\n${total.passed} passed, ${total.failed} failed`);
  });
  process.chdir(resolve(import.meta.dirname, '..'));
  makeDataFolder(data);
  atTheEnd(lock(join(data, 'test.lock'), 'The test run'));
  await ensureNodeModules();
  if (parts.includes('check')) count(await runChecks());
  if (parts.includes('unit') || parts.includes('e2e')) await withCluster();
  total.finished = true;
  return total.failed === 0 ? 0 : 1;
}

async function withCluster() {
  rmSync(folder, { recursive: true, force: true });
  say('Starting a database server for the tests');
  const server = await startTestCluster(folder);
  atTheEnd(async () => {
    await server.stop();
    const keep = total.failed > 0 && !process.env.CI;
    if (keep) say(`Kept, to be looked at, until the next run: ${folder}`);
    else for (const place of [server.place, folder]) rmSync(place, { recursive: true, force: true });
  });
  if (parts.includes('unit')) count(await runUnit(server.env));
  if (parts.includes('e2e')) count(await runBrowser(server.cluster));
}

async function runUnit(env) {
  say('Tests of the code, on PostgreSQL (vitest)');
  const file = join(folder, 'vitest.json');
  const reporters = ['--reporter=default', '--reporter=json', `--outputFile.json=${file}`];
  const words = ['--no-install', 'vitest', 'run', ...reporters, ...passedOn];
  const { code } = await run('npx', words, { env, show: true, acceptFailure: true });
  const report = readReport(file);
  // A file that cannot even be loaded has no tests to count.
  const unloadable = (report?.testResults ?? []).filter(
    (one) => one.status === 'failed' && !one.assertionResults.length,
  );
  return settle({
    passed: report?.numPassedTests ?? 0,
    failed: (report?.numFailedTests ?? 0) + unloadable.length,
    code,
  });
}

async function runBrowser(cluster) {
  await ensureChromium();
  const { address, env } = await startForBrowser(cluster);
  say('Tests in the browser (Playwright)');
  const file = join(folder, 'playwright.json');
  const { code } = await run('npx', ['--no-install', 'playwright', 'test', '--reporter=list,json', ...passedOn], {
    env: { ...env, KALENDS_URL: address, CHROMIUM_PATH: CHROMIUM, PLAYWRIGHT_JSON_OUTPUT_FILE: file },
    show: true,
    acceptFailure: true,
  });
  const { expected = 0, unexpected = 0, flaky = 0 } = readReport(file)?.stats ?? {};
  return settle({ passed: expected, failed: unexpected + flaky, code });
}

/** The built product with its demonstration, on a database and in a data folder of its own. */
async function startForBrowser(cluster) {
  const own = join(folder, 'e2e');
  makeDataFolder(own);
  const secrets = readSecrets(own);
  const name = 'kalends_e2e';
  await makeDatabase(cluster, name);
  const [appUrl, ownerUrl] = [cluster.appUrl(name), cluster.ownerUrl(name)];
  const logs = join(own, 'logs');
  const local = await startLocalServers({ data: own, logs, secrets });
  const reserved = await reservePort(0);
  const env = {
    NODE_ENV: 'production',
    NEXT_TELEMETRY_DISABLED: '1',
    AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED: 'true',
    PORT: String(reserved.port),
    KALENDS_URL: `http://127.0.0.1:${reserved.port}`,
    KALENDS_DATA: own,
    KALENDS_DEMONSTRATION: '1',
    // Every test signs in, from one address; the limit itself is tested on its own.
    KALENDS_SIGN_IN_ATTEMPTS: '10000',
    DATABASE_URL: appUrl,
    DATABASE_OWNER_URL: '',
    BETTER_AUTH_SECRET: secrets.auth,
    ...local,
  };
  if (!isBuilt()) {
    if (isLocked(join(data, 'start.lock'))) {
      throw new Refusal(
        'Kalends runs from this folder on an older build, which the tests would replace: stop it first.',
      );
    }
    await buildWorker();
    await buildWeb(env);
  }
  say('Filling in the demonstration for the browser');
  await migrate(ownerUrl, appUrl);
  await run(process.execPath, ['--import', 'tsx', 'scripts/seed.ts'], {
    env: { ...env, DATABASE_OWNER_URL: ownerUrl },
  });
  return { address: await startProduct({ env, reserved, logs }), env };
}

const readReport = (file) => (existsSync(file) ? JSON.parse(readFileSync(file, 'utf8')) : undefined);

/** A runner that is not content although no test has failed: that counts as one failure. */
const settle = ({ passed, failed, code }) => ({ passed, failed: code !== 0 && failed === 0 ? 1 : failed });

await live(main);
