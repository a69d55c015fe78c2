import { availableParallelism } from 'node:os';
import { run } from './run.mjs';
import { say } from './speak.mjs';

const SOURCES = ['app', 'components', 'entities', 'lib', 'migrations', 'scripts', 'tests'];

/** Slowest first, so that two cores finish together. */
const CHECKS = [
  ['Types', 'tsc', ['--noEmit']],
  ['Rules of the language', 'eslint', ['.', '--max-warnings=0']],
  ['Formatting', 'prettier', ['--check', '--log-level=warn', '.']],
  ['Who imports whom', 'depcruise', [...SOURCES, '--config', '.dependency-cruiser.cjs']],
  ['Nothing unused', 'knip', ['--no-progress']],
];

/** Runs every check, as many at once as there are cores, and shows the output of those that fail. */
export async function runChecks() {
  // The types of the routes are made, not written.
  await run('npx', ['--no-install', 'next', 'typegen'], { env: { NEXT_TELEMETRY_DISABLED: '1' } });
  const waiting = [...CHECKS];
  const result = { passed: 0, failed: 0 };
  const lane = async () => {
    for (let check = waiting.shift(); check; check = waiting.shift()) {
      const [name, program, args] = check;
      const { code, output } = await run('npx', ['--no-install', program, ...args], { acceptFailure: true });
      if (code === 0) result.passed += 1;
      else result.failed += 1;
      say(code === 0 ? `${name}: good` : `${name} (${program}): failed\n\n${output.trim()}\n`);
    }
  };
  await Promise.all(Array.from({ length: Math.max(1, Math.min(availableParallelism(), 4)) }, lane));
  return result;
}
