import { resolve } from 'node:path';
import { runChecks } from './machine/checks.mjs';
import { live } from './machine/lifecycle.mjs';
import { ensureNodeModules } from './machine/node-modules.mjs';

/** `npm run check`: types, lint, formatting, layers and unused code. */
await live(async () => {
  process.chdir(resolve(import.meta.dirname, '..'));
  await ensureNodeModules();
  const { failed } = await runChecks();
  return failed === 0 ? 0 : 1;
});
