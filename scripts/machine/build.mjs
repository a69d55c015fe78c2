import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { run } from './run.mjs';
import { say } from './speak.mjs';

const FOLDERS = ['app', 'components', 'entities', 'fonts', 'lib', 'migrations', 'public'];
const FILES = [
  'instrumentation.ts',
  'next.config.ts',
  'package-lock.json',
  'postcss.config.mjs',
  'proxy.ts',
  'tailwind.config.ts',
  'tsconfig.json',
];
const STAMP = '.next/kalends-sources';
const WORKER = 'dist/worker';

function filesIn(folder) {
  return readdirSync(folder, { withFileTypes: true })
    .sort((a, b) => (a.name < b.name ? -1 : 1))
    .flatMap((entry) => (entry.isDirectory() ? filesIn(join(folder, entry.name)) : [join(folder, entry.name)]));
}

/** One number for everything that a build depends on. */
function fingerprint() {
  const hash = createHash('sha256').update(process.version);
  const files = [
    ...FOLDERS.filter((folder) => existsSync(folder)).flatMap(filesIn),
    ...FILES,
    'scripts/build-worker.ts',
  ];
  for (const file of files) {
    if (existsSync(file) && statSync(file).isFile()) hash.update(`${file}\0`).update(readFileSync(file)).update('\0');
  }
  return hash.digest('hex');
}

const stamp = () => (existsSync(STAMP) ? readFileSync(STAMP, 'utf8') : '');

export const isBuilt = () => existsSync('.next/BUILD_ID') && existsSync(WORKER) && stamp() === fingerprint();

/** Bundles the engine's thread, which the worker and the command line load by its path. */
export async function buildWorker() {
  await run('npm', ['run', 'build:worker']);
}

/** Builds the web server's part. The note about the sources is written last, so that a broken build is never taken for one. */
export async function buildWeb(env) {
  rmSync(STAMP, { force: true });
  const sources = fingerprint();
  say('Building the product (next build)');
  await run(process.execPath, ['node_modules/next/dist/bin/next', 'build'], {
    env: { ...env, NODE_ENV: 'production', NEXT_TELEMETRY_DISABLED: '1' },
  });
  writeFileSync(STAMP, sources);
}
