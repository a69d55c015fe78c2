import { route } from '@/lib/http/route';
import { savePlanSection } from '@/lib/studies/commands';
import { savePlanSectionOperation } from '@/lib/studies/operations';

export const PUT = route(savePlanSectionOperation, savePlanSection);
