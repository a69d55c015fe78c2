import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { run } from './run.mjs';
import { Refusal, say } from './speak.mjs';

export const isRoot = process.getuid?.() === 0;

const APT = ['-y', '--no-install-recommends', '-o', 'Dpkg::Options::=--force-confold', '-o', 'DPkg::Lock::Timeout=300'];
let listsAreFresh = false;

/** Installs Debian packages, which only root may; anybody else is told what is missing. */
async function install(packages, what) {
  if (!isRoot || !existsSync('/usr/bin/apt-get')) {
    throw new Refusal(
      `${what} is missing. Install it (on Debian, as root: apt-get install ${packages.join(' ')}) and start again.`,
    );
  }
  const env = { DEBIAN_FRONTEND: 'noninteractive' };
  if (!listsAreFresh) {
    say('Reading Debian’s package lists');
    await run('apt-get', ['update', '-q'], { env });
    listsAreFresh = true;
  }
  say(`Installing ${what} from Debian`);
  await run('apt-get', ['install', '-q', ...APT, ...packages], { env });
}

export async function installPostgres() {
  await install(['postgresql-common'], 'PostgreSQL’s common part');
  // We make a cluster of our own; Debian need not start another that nobody uses.
  const file = '/etc/postgresql-common/createcluster.conf';
  const text = existsSync(file) ? readFileSync(file, 'utf8') : '';
  const line = 'create_main_cluster = false';
  if (!/^create_main_cluster\s*=/m.test(text)) writeFileSync(file, `${text}\n${line}\n`);
  await install(['postgresql'], 'PostgreSQL');
}

export const CHROMIUM = process.env.CHROMIUM_PATH ?? '/usr/bin/chromium';

export async function ensureChromium() {
  if (!existsSync(CHROMIUM)) await install(['chromium'], 'Chromium, for the browser tests,');
}
