import { listAuditOperation } from '@/lib/audit/operations';
import { listAudit } from '@/lib/audit/queries';
import { route } from '@/lib/http/route';

export const GET = route(listAuditOperation, listAudit);
