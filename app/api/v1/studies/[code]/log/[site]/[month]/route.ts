import { route } from '@/lib/http/route';
import { correctMonth, logMonth } from '@/lib/site-log/commands';
import { correctMonthOperation, logMonthOperation } from '@/lib/site-log/operations';

export const PUT = route(logMonthOperation, logMonth);
export const PATCH = route(correctMonthOperation, correctMonth);
