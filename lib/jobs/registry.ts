import PgBoss from 'pg-boss';
import { deliverMail } from '../email/jobs';
import { computeForecastRun, recoverStalledRuns } from '../forecasts/jobs';
import { log } from '../log';
import { type JobPayload, type QueueName, QUEUES } from './queues';

const HANDLERS: { [Q in QueueName]: (payload: JobPayload<Q>) => Promise<void> } = {
  'forecast-run': (payload) => computeForecastRun(payload),
  'mail-deliver': deliverMail,
};

const RECOVERY_MILLISECONDS = 10_000;

/** Takes jobs until stopped. Stopping waits for the jobs at hand. */
export async function startWorker({ url }: { url: string }): Promise<{ stop(): Promise<void> }> {
  const boss = new PgBoss({ connectionString: url, migrate: false, maintenanceIntervalSeconds: 15 });
  boss.on('error', (error) => log.error({ err: error }, 'queue'));
  await boss.start();
  const recover = (): void =>
    void recoverStalledRuns(boss).catch((error: unknown) => log.error({ err: error }, 'recovery of stalled runs'));
  recover();
  const timer = setInterval(recover, RECOVERY_MILLISECONDS);
  for (const name of Object.keys(QUEUES) as QueueName[]) await take(boss, name);
  return {
    stop: () => {
      clearInterval(timer);
      return boss.stop({ graceful: true, timeout: 20_000 });
    },
  };
}

async function take<Q extends QueueName>(boss: PgBoss, name: Q): Promise<void> {
  const handle = HANDLERS[name] as (payload: JobPayload<Q>) => Promise<void>;
  await boss.work<unknown>(name, { batchSize: 1, pollingIntervalSeconds: 0.5 }, async ([job]) => {
    if (!job) return;
    const started = Date.now();
    await handle(QUEUES[name].payload.parse(job.data) as JobPayload<Q>);
    log.info({ queue: name, job: job.id, milliseconds: Date.now() - started }, 'job done');
  });
}
