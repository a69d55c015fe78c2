import { existsSync, readFileSync } from 'node:fs';
import { run } from './run.mjs';
import { Refusal, say } from './speak.mjs';

const packagesOf = (file) => JSON.parse(readFileSync(file, 'utf8')).packages;

/** Whether what npm noted down after its last complete install is what the lock file asks for. */
function upToDate() {
  const note = 'node_modules/.package-lock.json';
  if (!existsSync(note)) return false;
  const installed = packagesOf(note);
  return Object.entries(packagesOf('package-lock.json')).every(([path, wanted]) => {
    // The product itself, and what npm leaves out on other machines' behalf.
    if (path === '' || wanted.link || (wanted.optional && !installed[path])) return true;
    const { version, integrity } = installed[path] ?? {};
    return version === wanted.version && integrity === wanted.integrity;
  });
}

export async function ensureNodeModules() {
  const [major, minor] = process.versions.node.split('.').map(Number);
  if (major < 20 || (major === 20 && minor < 9)) {
    throw new Refusal(`Node 20.9 or later is needed; this is ${process.versions.node}.`);
  }
  if (upToDate()) return;
  say('Installing the node modules (npm ci)');
  await run('npm', ['ci', '--no-audit', '--no-fund', '--loglevel=error'], { env: { NODE_ENV: 'development' } });
}
