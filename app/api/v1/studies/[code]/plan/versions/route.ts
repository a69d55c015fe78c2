import { route } from '@/lib/http/route';
import { savePlanVersion } from '@/lib/studies/commands';
import { savePlanVersionOperation } from '@/lib/studies/operations';

export const POST = route(savePlanVersionOperation, savePlanVersion);
