import { previewCutOperation } from '@/lib/data-cuts/operations';
import { previewCut } from '@/lib/data-cuts/queries';
import { route } from '@/lib/http/route';

export const POST = route(previewCutOperation, previewCut);
