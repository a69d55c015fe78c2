import { route } from '@/lib/http/route';
import { comparePlanVersionsOperation } from '@/lib/studies/operations';
import { comparePlanVersions } from '@/lib/studies/queries';

export const GET = route(comparePlanVersionsOperation, comparePlanVersions);
