import { getStudyFileOperation } from '@/lib/forecasts/operations';
import { getStudyFile } from '@/lib/forecasts/queries';
import { route } from '@/lib/http/route';

export const GET = route(getStudyFileOperation, getStudyFile);
