import { route } from '@/lib/http/route';
import { previewSiteListOperation } from '@/lib/site-lists/operations';
import { previewSiteList } from '@/lib/site-lists/queries';

export const POST = route(previewSiteListOperation, previewSiteList);
