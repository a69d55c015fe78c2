import { getForecastFileOperation } from '@/lib/forecasts/operations';
import { getForecastFile } from '@/lib/forecasts/queries';
import { route } from '@/lib/http/route';

export const GET = route(getForecastFileOperation, getForecastFile);
