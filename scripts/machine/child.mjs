import { spawn } from 'node:child_process';
import { closeSync, mkdirSync, openSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { isEnding } from './lifecycle.mjs';
import { Refusal } from './speak.mjs';
import { endGroup, watch } from './watchman.mjs';

/**
 * A program that runs beside us until we stop it: in a process group of its own, writing to a log of its own.
 * @param {{ name: string, args: string[], env: Record<string, string>, logs: string, patience?: number, talks?: boolean, onDeath: (why: string) => void }} options
 */
export function startChild({ name, args, env, logs, patience, talks = false, onDeath }) {
  mkdirSync(logs, { recursive: true });
  const file = join(logs, `${name}.log`);
  const log = openSync(file, 'w', 0o600);
  const child = spawn(process.execPath, args, {
    env: { ...process.env, ...env },
    stdio: talks ? ['ignore', log, log, 'ipc'] : ['ignore', log, log],
    detached: true,
  });
  closeSync(log);
  const unwatch = watch({ group: child.pid });
  let stopped = false;
  const gone = new Promise((resolve) => {
    child.on('error', (error) => resolve(error.message));
    child.on('exit', (code, signal) => resolve(signal ?? `code ${code}`));
  }).then((how) => {
    unwatch();
    const lastLines = () =>
      readFileSync(file, 'utf8')
        .trim()
        .split('\n')
        .slice(-12)
        .map((line) => line.slice(0, 500))
        .join('\n');
    const why = `${name} has ended (${how}). Its last lines, from ${file}:\n${lastLines()}`;
    if (!stopped && !isEnding()) onDeath(why);
    return why;
  });
  return {
    pid: child.pid,
    gone,
    /** What the child says of itself once it is ready. */
    ready: () =>
      Promise.race([
        new Promise((resolve) => child.once('message', resolve)),
        gone.then((why) => Promise.reject(new Refusal(why))),
      ]),
    stop: async () => {
      stopped = true;
      await endGroup(child.pid, patience);
      await gone;
    },
  };
}
