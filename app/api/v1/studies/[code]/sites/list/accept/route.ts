import { route } from '@/lib/http/route';
import { acceptSiteList } from '@/lib/site-lists/commands';
import { acceptSiteListOperation } from '@/lib/site-lists/operations';

export const POST = route(acceptSiteListOperation, acceptSiteList);
