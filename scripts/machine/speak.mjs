/** Something the person at the terminal can put right: shown as one line, without a stack. */
export class Refusal extends Error {}

const started = Date.now();

export function say(line) {
  const seconds = ((Date.now() - started) / 1000).toFixed(1).padStart(5);
  process.stdout.write(`${seconds} s  ${line}\n`);
}

/** Ends the program as its caller should see it: a refusal is one line, anything else keeps its stack. */
export function explain(error) {
  if (error instanceof Refusal) process.stderr.write(`\n${error.message}\n`);
  else process.stderr.write(`\n${error?.stack ?? error}\n`);
}
