import PgBoss from 'pg-boss';
import { QUEUES } from './queues';

/** Makes the queue's tables and its queues, and opens them to the application's role; needs the owner's role, so migrating does it. */
export async function installQueues(ownerUrl: string): Promise<void> {
  const boss = new PgBoss({ connectionString: ownerUrl, supervise: false, schedule: false, max: 1 });
  await boss.start();
  for (const [name, { options }] of Object.entries(QUEUES)) await boss.createQueue(name, { name, ...options });
  await boss
    .getDb()
    .executeSql(
      `grant usage on schema pgboss to kalends_app; grant select, insert, update, delete on all tables in schema pgboss to kalends_app; grant execute on all functions in schema pgboss to kalends_app`,
      [],
    );
  await boss.stop({ graceful: false });
}
