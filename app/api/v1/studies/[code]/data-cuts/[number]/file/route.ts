import { getCutFileOperation } from '@/lib/data-cuts/operations';
import { getCutFile } from '@/lib/data-cuts/queries';
import { route } from '@/lib/http/route';

export const GET = route(getCutFileOperation, getCutFile);
