import { getRunOperation } from '@/lib/forecasts/operations';
import { getRun } from '@/lib/forecasts/queries';
import { route } from '@/lib/http/route';

export const GET = route(getRunOperation, getRun);
