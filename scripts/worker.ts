import { startWorker } from '@/lib/jobs/registry';
import { env } from '@/lib/env';
import { log } from '@/lib/log';

/** Takes jobs from the queue until told to stop, and then finishes what it has at hand. */
const { databaseUrl } = env();
if (!databaseUrl) throw new Error('DATABASE_URL is not set: start the product with npm start, or set it.');

const worker = await startWorker({ url: databaseUrl });
log.info('worker ready');
process.send?.({ ready: true });

let stopping: Promise<void> | undefined;
for (const signal of ['SIGTERM', 'SIGINT', 'SIGHUP'] as const) {
  process.on(signal, () => {
    stopping ??= worker.stop().then(
      () => process.exit(0),
      (error: unknown) => {
        log.error({ err: error }, 'worker did not stop cleanly');
        process.exit(1);
      },
    );
  });
}
