import { route } from '@/lib/http/route';
import { getPlanVersionOperation } from '@/lib/studies/operations';
import { getPlanVersion } from '@/lib/studies/queries';

export const GET = route(getPlanVersionOperation, getPlanVersion);
