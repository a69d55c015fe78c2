import { fork } from 'node:child_process';
import { once } from 'node:events';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

export interface LocalServer {
  port: number;
  folder: string;
  stop: () => Promise<void>;
}

/** Starts one of the local servers of `npm start` over an empty folder. */
export async function startLocalServer(
  name: 'local-mail' | 'local-files',
  settings: (folder: string) => Record<string, string>,
): Promise<LocalServer> {
  const folder = mkdtempSync(join(tmpdir(), `kalends-${name}-`));
  const child = fork(`scripts/machine/${name}.mjs`, { env: { ...process.env, ...settings(folder) }, execArgv: [] });
  const [{ port }] = (await once(child, 'message')) as [{ port: number }];
  return {
    port,
    folder,
    stop: async () => {
      const gone = once(child, 'exit');
      child.kill();
      await gone;
      rmSync(folder, { recursive: true, force: true });
    },
  };
}
