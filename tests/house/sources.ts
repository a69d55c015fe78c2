import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';

const FOLDERS = ['app', 'components', 'entities', 'lib', 'migrations', 'scripts', 'tests'];

const filesIn = (folder: string): string[] =>
  readdirSync(folder, { withFileTypes: true }).flatMap((entry) =>
    entry.isDirectory() ? filesIn(join(folder, entry.name)) : [join(folder, entry.name)],
  );

/** Every source file of the house, as a path from its root. */
export const sourceFiles = FOLDERS.filter((folder) => existsSync(folder))
  .flatMap(filesIn)
  .filter((path) => !/(^|\/)\./.test(path) && /\.(ts|tsx|mjs|cjs|css)$/.test(path));

export const read = (path: string): string => readFileSync(path, 'utf8');
