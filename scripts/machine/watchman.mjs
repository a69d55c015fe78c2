import { spawn, spawnSync } from 'node:child_process';
import { rmSync } from 'node:fs';
import { createInterface } from 'node:readline';
import { setTimeout as wait } from 'node:timers/promises';
import { fileURLToPath } from 'node:url';

/**
 * A program that is killed outright cannot tidy up after itself. The watchman is a small process beside it that holds
 * a list of what was started and the other end of a pipe: when the pipe closes, it stops whatever is left on the list.
 */
const SELF = fileURLToPath(import.meta.url);
let watchman;
let next = 0;

/**
 * Puts something on the watchman's list and gives a function that takes it off again.
 * @param {{ group?: number, command?: string[], folder?: string }} entry a process group, a command to run, a folder to remove
 */
export function watch(entry) {
  if (!watchman) {
    watchman = spawn(process.execPath, [SELF], { stdio: ['pipe', 'ignore', 'ignore'], detached: true, cwd: '/' });
    watchman.stdin.on('error', () => {});
    watchman.stdin.unref();
    watchman.unref();
  }
  const id = (next += 1);
  watchman.stdin.write(`${JSON.stringify({ id, entry })}\n`);
  return () => watchman.stdin.write(`${JSON.stringify({ id })}\n`);
}

/** Asks a process group to end, and makes it after a while. */
export async function endGroup(pid, patience = 8000) {
  const alive = (signal) => {
    try {
      return process.kill(-pid, signal);
    } catch {
      return false;
    }
  };
  if (!alive('SIGTERM')) return;
  for (const until = Date.now() + patience; Date.now() < until; await wait(50)) if (!alive(0)) return;
  alive('SIGKILL');
}

async function stand() {
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, () => {});
  const list = new Map();
  for await (const line of createInterface({ input: process.stdin })) {
    const { id, entry } = JSON.parse(line);
    if (entry) list.set(id, entry);
    else list.delete(id);
  }
  const left = [...list.values()].reverse();
  await Promise.all(left.filter(({ group }) => group).map(({ group }) => endGroup(group)));
  for (const { command } of left) if (command) spawnSync(command[0], command.slice(1), { stdio: 'ignore' });
  for (const { folder } of left) if (folder) rmSync(folder, { recursive: true, force: true });
}

if (process.argv[1] === SELF) await stand();
