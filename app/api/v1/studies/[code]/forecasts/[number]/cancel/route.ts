import { cancelForecast } from '@/lib/forecasts/commands';
import { cancelForecastOperation } from '@/lib/forecasts/operations';
import { route } from '@/lib/http/route';

export const POST = route(cancelForecastOperation, cancelForecast);
