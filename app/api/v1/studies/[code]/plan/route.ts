import { route } from '@/lib/http/route';
import { getPlanOperation } from '@/lib/studies/operations';
import { getPlan } from '@/lib/studies/queries';

export const GET = route(getPlanOperation, getPlan);
