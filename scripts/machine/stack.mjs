import { mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { setTimeout as wait } from 'node:timers/promises';
import { startChild } from './child.mjs';
import { atTheEnd, end, isEnding } from './lifecycle.mjs';
import { explain, Refusal, say } from './speak.mjs';

const NEXT = 'node_modules/next/dist/bin/next';

function down(why) {
  explain(new Refusal(why));
  void end(1);
}

function start(options) {
  const child = startChild({ onDeath: down, ...options });
  atTheEnd(child.stop);
  return child;
}

/** The relay and the file store on this machine, for what the environment does not name. Gives the settings to reach them. */
export async function startLocalServers({ data, logs, secrets }) {
  const settings = {};
  if (!process.env.SMTP_URL) {
    const env = { KALENDS_MAILBOX_FOLDER: join(data, 'mailbox') };
    const mail = start({ name: 'mail', args: ['scripts/machine/local-mail.mjs'], env, logs, talks: true });
    settings.SMTP_URL = `smtp://127.0.0.1:${(await mail.ready()).port}`;
  }
  if (!process.env.S3_ENDPOINT) {
    const keys = { S3_ACCESS_KEY: secrets.s3AccessKey, S3_SECRET_KEY: secrets.s3SecretKey };
    const folder = join(data, 'files');
    mkdirSync(folder, { recursive: true, mode: 0o700 });
    const env = { ...keys, KALENDS_FILES_FOLDER: folder };
    const files = start({ name: 'files', args: ['scripts/machine/local-files.mjs'], env, logs, talks: true });
    Object.assign(settings, keys, { S3_ENDPOINT: `http://127.0.0.1:${(await files.ready()).port}` });
  }
  return settings;
}

/** The web server and the queue worker; done when the web server answers. */
export async function startProduct({ env, reserved: { port, release }, logs }) {
  startWorker({ env, logs });
  await release();
  const web = start({ name: 'web', args: [NEXT, 'start', '-H', '127.0.0.1', '-p', String(port)], env, logs });
  const address = `http://127.0.0.1:${port}`;
  await waitForAnswer(`${address}/api/health`, web);
  return address;
}

async function waitForAnswer(url, web) {
  let ended = false;
  void web.gone.then(() => (ended = true));
  for (const until = Date.now() + 60_000; Date.now() < until && !ended; await wait(100)) {
    const answer = await fetch(url, { signal: AbortSignal.timeout(5000) }).catch(() => undefined);
    if (!answer?.ok) continue;
    // Somebody else may have answered, on a port that ours did not get.
    await wait(250);
    if (!ended) return;
  }
  // Where it has ended, that has been said already, with its last lines.
  if (ended) await end(1);
  throw new Refusal(`The web server does not answer at ${url} within a minute; its log says why.`);
}

/** A worker that dies is started again, later each time: its jobs wait in the queue meanwhile. */
function startWorker({ env, logs }) {
  let pause = 1000;
  let current;
  const launch = () => {
    const began = Date.now();
    current = startChild({
      name: 'worker',
      args: ['--import', 'tsx', 'scripts/worker.ts'],
      env,
      logs,
      // It finishes the job at hand first.
      patience: 25_000,
      talks: true,
      onDeath: (why) => {
        pause = Date.now() - began > 60_000 ? 1000 : Math.min(pause * 2, 30_000);
        say(`${why}\n         It is started again in ${pause / 1000} s`);
        setTimeout(() => isEnding() || launch(), pause);
      },
    });
  };
  launch();
  atTheEnd(() => current.stop());
}
