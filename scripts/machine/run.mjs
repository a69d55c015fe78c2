import { spawn } from 'node:child_process';
import { Refusal } from './speak.mjs';
import { watch } from './watchman.mjs';

const running = new Set();

/**
 * Runs a program to its end and gives what it printed. In a group of its own, so that `stopRunning()` reaches whatever
 * it has started in turn. A failure carries the end of the output, which is where programs say why.
 */
export function run(command, args, { env, cwd, input, show = false, acceptFailure = false } = {}) {
  return new Promise((resolve, reject) => {
    const child = spawn(command, args, {
      cwd,
      env: { ...process.env, ...env },
      stdio: [input === undefined ? 'ignore' : 'pipe', show ? 'inherit' : 'pipe', show ? 'inherit' : 'pipe'],
      detached: true,
    });
    running.add(child);
    const unwatch = child.pid === undefined ? () => {} : watch({ group: child.pid });
    let output = '';
    let stdout = '';
    child.stdout?.setEncoding('utf8').on('data', (text) => {
      stdout += text;
      output += text;
    });
    child.stderr?.setEncoding('utf8').on('data', (text) => (output += text));
    child.stdin?.on('error', () => {});
    child.stdin?.end(input);
    child.on('error', (error) => {
      running.delete(child);
      reject(error.code === 'ENOENT' ? new Refusal(`${command} is not installed.`) : error);
    });
    const finish = (code, signal) => {
      if (!running.delete(child)) return;
      unwatch();
      child.stdout?.destroy();
      child.stderr?.destroy();
      const result = { code: code ?? 1, signal, stdout, output };
      if (code === 0 || acceptFailure) return resolve(result);
      const tail = output.trim().split('\n').slice(-25).join('\n');
      const how = `${command} ${args.join(' ')} failed (${signal ?? code})`;
      return reject(new Refusal(tail ? `${how}:\n${tail}` : how));
    };
    child.on('close', finish);
    // A daemon that the program has left behind may keep its output open for ever.
    child.on('exit', (code, signal) => setTimeout(() => finish(code, signal), 1000).unref());
  });
}

/** Stops what is still running, when we are told to stop in the middle of a step. */
export function stopRunning() {
  for (const child of running) {
    try {
      process.kill(-child.pid, 'SIGTERM');
    } catch {
      // It has ended by itself meanwhile.
    }
  }
}
