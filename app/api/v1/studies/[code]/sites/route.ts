import { route } from '@/lib/http/route';
import { addSite } from '@/lib/sites/commands';
import { addSiteOperation, listSitesOperation } from '@/lib/sites/operations';
import { listSites } from '@/lib/sites/queries';

export const GET = route(listSitesOperation, listSites);
export const POST = route(addSiteOperation, addSite);
