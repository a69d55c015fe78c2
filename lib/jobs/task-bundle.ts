import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readdirSync, readFileSync, renameSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { build } from 'esbuild';

/** From the working directory, which is the checkout: bundlers move this module, but not the sources. */
const SOURCES = ['lib/engine', 'lib/jobs/forecast-task.ts'];
const FOLDER = 'dist/worker';

function sourcesHash(): string {
  const hash = createHash('sha256').update(process.version);
  for (const source of SOURCES) {
    const files = source.endsWith('.ts')
      ? [source]
      : readdirSync(source)
          .sort()
          .map((name) => join(source, name));
    for (const file of files) hash.update(file).update(readFileSync(file));
  }
  return hash.digest('hex').slice(0, 16);
}

/**
 * The engine's thread as one file that Node loads by itself, made where the engine's sources have changed (about a tenth of
 * a second). Its name holds the sources' hash, so that an old one is never taken for a new one.
 */
export async function taskBundle(): Promise<string> {
  const file = join(process.cwd(), FOLDER, `task-${sourcesHash()}.mjs`);
  if (existsSync(file)) return file;
  mkdirSync(FOLDER, { recursive: true });
  const { outputFiles } = await build({
    entryPoints: ['lib/jobs/forecast-task.ts'],
    bundle: true,
    write: false,
    platform: 'node',
    format: 'esm',
    target: 'node20',
    banner: { js: `import { createRequire } from 'node:module'; const require = createRequire(import.meta.url);` },
    logLevel: 'silent',
  });
  // Written beside and renamed: two processes that make it at once both end with a whole file.
  const partial = `${file}.${process.pid}`;
  writeFileSync(partial, outputFiles[0]!.contents);
  renameSync(partial, file);
  return file;
}
