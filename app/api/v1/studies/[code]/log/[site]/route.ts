import { route } from '@/lib/http/route';
import { getMonthSheetOperation } from '@/lib/site-log/operations';
import { getMonthSheet } from '@/lib/site-log/queries';

export const GET = route(getMonthSheetOperation, getMonthSheet);
