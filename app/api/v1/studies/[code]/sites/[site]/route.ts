import { route } from '@/lib/http/route';
import { changeSite } from '@/lib/sites/commands';
import { changeSiteOperation, getSiteOperation } from '@/lib/sites/operations';
import { getSite } from '@/lib/sites/queries';

export const GET = route(getSiteOperation, getSite);
export const PUT = route(changeSiteOperation, changeSite);
