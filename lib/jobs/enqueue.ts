import type { EntityManager } from '@mikro-orm/postgresql';
import PgBoss from 'pg-boss';
import { type JobPayload, type QueueName, QUEUES } from './queues';

interface TransactionClient {
  client: { acquireConnection(): Promise<{ query(text: string, values: unknown[]): Promise<{ rows: unknown[] }> }> };
}

/**
 * Puts a job on its queue inside the caller's transaction: it exists exactly when the change that asked for it does.
 * pg-boss writes through the transaction's own connection.
 */
export async function enqueue<Q extends QueueName>(em: EntityManager, queue: Q, payload: JobPayload<Q>): Promise<void> {
  const transaction = em.getTransactionContext<TransactionClient>();
  if (!transaction) throw new Error(`${queue}: a job is only ever enqueued inside a transaction`);
  const connection = await transaction.client.acquireConnection();
  const db = { executeSql: async (text: string, values: unknown[]) => connection.query(text, values) };
  const id = await new PgBoss({ db }).send(queue, payload, { ...QUEUES[queue].options, db });
  if (!id) throw new Error(`${queue}: the job was not accepted`);
}
