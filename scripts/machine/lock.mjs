import { readFileSync, rmSync, writeFileSync } from 'node:fs';
import { Refusal } from './speak.mjs';

/** When a process began, in ticks since the machine did: tells it from a later one with the same number. */
function bornAt(pid) {
  try {
    const fields = readFileSync(`/proc/${pid}/stat`, 'utf8').split(') ').pop().split(' ');
    return fields[0] === 'Z' ? undefined : fields[19];
  } catch {
    return undefined;
  }
}

function holderOf(file) {
  try {
    const { pid, born, what } = JSON.parse(readFileSync(file, 'utf8'));
    return bornAt(pid) === born ? { pid, what } : undefined;
  } catch {
    return undefined;
  }
}

export const isLocked = (file) => holderOf(file) !== undefined;

/** One start at a time over one folder. The lock of a program that no longer runs is taken over. */
export function lock(file, what) {
  const text = JSON.stringify({ pid: process.pid, born: bornAt(process.pid), what });
  for (let attempt = 1; ; attempt += 1) {
    try {
      writeFileSync(file, text, { flag: 'wx', mode: 0o644 });
      return () => rmSync(file, { force: true });
    } catch (error) {
      if (error.code !== 'EEXIST') throw error;
      const holder = holderOf(file);
      if (holder || attempt === 3) {
        throw new Refusal(
          `${holder?.what ?? what} runs from this folder already (process ${holder?.pid ?? 'unknown'}); stop it first.`,
        );
      }
      rmSync(file, { force: true });
    }
  }
}
