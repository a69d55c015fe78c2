import { stopRunning } from './run.mjs';
import { explain, say } from './speak.mjs';

const closers = [];
let ending;

/** Registers what has to be undone at the end; undone in the opposite order. */
export function atTheEnd(close) {
  closers.push(close);
}

export const isEnding = () => ending !== undefined;

/** Undoes everything that was started, once, and leaves with this code. */
export function end(code) {
  ending ??= (async () => {
    stopRunning();
    for (let close = closers.pop(); close; close = closers.pop()) {
      try {
        await close();
      } catch (error) {
        explain(error);
      }
    }
    process.exit(code);
  })();
  return ending;
}

/** Runs a program so that however it ends, nothing that it has started stays behind. */
export async function live(main) {
  for (const [signal, number] of Object.entries({ SIGINT: 2, SIGTERM: 15, SIGHUP: 1 })) {
    process.on(signal, () => {
      if (!ending) say('Stopping');
      void end(128 + number);
    });
  }
  const fail = (error) => {
    if (!ending) explain(error);
    return end(1);
  };
  process.on('uncaughtException', fail);
  process.on('unhandledRejection', fail);
  try {
    const code = await main();
    if (code !== undefined) await end(code);
  } catch (error) {
    await fail(error);
  }
}
