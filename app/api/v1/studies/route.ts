import { route } from '@/lib/http/route';
import { listStudiesOperation } from '@/lib/portfolio/operations';
import { listStudies } from '@/lib/portfolio/queries';
import { createStudy } from '@/lib/studies/commands';
import { createStudyOperation } from '@/lib/studies/operations';

export const GET = route(listStudiesOperation, listStudies);
export const POST = route(createStudyOperation, createStudy);
