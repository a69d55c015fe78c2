import { route } from '@/lib/http/route';
import { publishForecast } from '@/lib/publications/commands';
import { listPublicationsOperation, publishForecastOperation } from '@/lib/publications/operations';
import { listPublications } from '@/lib/publications/queries';

export const GET = route(listPublicationsOperation, listPublications);
export const POST = route(publishForecastOperation, publishForecast);
