import { requestForecast } from '@/lib/forecasts/commands';
import { listRunsOperation, requestForecastOperation } from '@/lib/forecasts/operations';
import { listRuns } from '@/lib/forecasts/queries';
import { route } from '@/lib/http/route';

export const GET = route(listRunsOperation, listRuns);
export const POST = route(requestForecastOperation, requestForecast);
