import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { existsSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { createInterface } from 'node:readline';
import { afterAll, describe, expect, it, vi } from 'vitest';

const folder = mkdtempSync(join(tmpdir(), 'kalends-behind-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

const alive = (pid: number): boolean => {
  try {
    return process.kill(pid, 0) && !readFileSync(`/proc/${pid}/stat`, 'utf8').includes(') Z ');
  } catch {
    return false;
  }
};

/** Runs a small program against the machine's own modules and gives its first line of output. */
async function program(code: string) {
  const child = spawn(process.execPath, ['--input-type=module', '-e', code], { stdio: ['ignore', 'pipe', 'pipe'] });
  const line = await new Promise<string>((resolve) => createInterface({ input: child.stdout }).once('line', resolve));
  return { child, line, gone: once(child, 'exit') };
}

const startSleeper = (ending: string, doomed: string): string => `
  import { startChild } from './scripts/machine/child.mjs';
  import { atTheEnd, live } from './scripts/machine/lifecycle.mjs';
  import { watch } from './scripts/machine/watchman.mjs';
  await live(async () => {
    const sleeper = startChild({ name: 'sleeper', args: ['-e', 'setInterval(() => {}, 1000)'], env: {}, logs: '${folder}', onDeath: () => {} });
    atTheEnd(sleeper.stop);
    watch({ folder: '${doomed}' });
    setInterval(() => {}, 1000);
    console.log(sleeper.pid);
    ${ending}
  });`;

describe('whatever has been started', () => {
  it.each(['SIGTERM', 'SIGINT', 'SIGKILL'] as const)('is gone after %s', async (signal) => {
    const doomed = mkdtempSync(join(folder, 'doomed-'));
    const { child, line, gone } = await program(startSleeper('', doomed));
    const pid = Number(line);
    expect(alive(pid)).toBe(true);
    child.kill(signal);
    await gone;
    await vi.waitFor(() => expect(alive(pid)).toBe(false), { timeout: 10_000, interval: 50 });
    // Only somebody else can tidy up after a program that was killed outright.
    await vi.waitFor(() => expect(existsSync(doomed)).toBe(false), { timeout: 10_000, interval: 50 });
  });

  it('is gone after a mistake in the middle', async () => {
    const doomed = mkdtempSync(join(folder, 'doomed-'));
    const { child, line, gone } = await program(startSleeper(`throw new Error('in the middle');`, doomed));
    await gone;
    expect(child.exitCode).toBe(1);
    expect(alive(Number(line))).toBe(false);
  });
});

describe('the lock of a folder', () => {
  const file = join(folder, 'start.lock');
  const take = `
    import { lock } from './scripts/machine/lock.mjs';
    try { lock('${file}', 'Kalends'); console.log('taken'); setInterval(() => {}, 1000); } catch (error) { console.log(error.message); }`;

  it('is held against a second start, and taken over from one that was killed', async () => {
    const first = await program(take);
    expect(first.line).toBe('taken');
    const second = await program(take);
    expect(second.line).toBe(`Kalends runs from this folder already (process ${first.child.pid}); stop it first.`);
    first.child.kill('SIGKILL');
    await first.gone;
    const third = await program(take);
    expect(third.line).toBe('taken');
    third.child.kill('SIGKILL');
    await third.gone;
  });

  it('is not mistaken for that of a later process with the same number', async () => {
    writeFileSync(file, JSON.stringify({ pid: process.pid, born: '1', what: 'Kalends' }));
    const { child, line, gone } = await program(take);
    expect(line).toBe('taken');
    child.kill('SIGKILL');
    await gone;
  });
});
