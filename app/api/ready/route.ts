import { getOrm } from '@/lib/db/orm';
import { log } from '@/lib/log';

/** Ready to serve: the database answers and the queue's tables are there. */
export async function GET(): Promise<Response> {
  const headers = { 'cache-control': 'no-store' };
  try {
    await getOrm().em.fork().execute('select 1 from pgboss.version');
    return Response.json({ status: 'ready' }, { headers });
  } catch (error) {
    log.error({ err: error }, 'not ready');
    return Response.json({ status: 'not ready', detail: 'The database does not answer.' }, { status: 503, headers });
  }
}
