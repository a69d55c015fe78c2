import { acceptCut } from '@/lib/data-cuts/commands';
import { acceptCutOperation, listCutsOperation } from '@/lib/data-cuts/operations';
import { listCuts } from '@/lib/data-cuts/queries';
import { route } from '@/lib/http/route';

export const GET = route(listCutsOperation, listCuts);
export const POST = route(acceptCutOperation, acceptCut);
