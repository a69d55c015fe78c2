import { getCutOperation } from '@/lib/data-cuts/operations';
import { getCut } from '@/lib/data-cuts/queries';
import { route } from '@/lib/http/route';

export const GET = route(getCutOperation, getCut);
