import { route } from '@/lib/http/route';
import { getStudyOperation } from '@/lib/studies/operations';
import { getStudyFrame } from '@/lib/studies/queries';

export const GET = route(getStudyOperation, getStudyFrame);
