import { route } from '@/lib/http/route';
import { listLogOperation } from '@/lib/site-log/operations';
import { listLog } from '@/lib/site-log/queries';

export const GET = route(listLogOperation, listLog);
