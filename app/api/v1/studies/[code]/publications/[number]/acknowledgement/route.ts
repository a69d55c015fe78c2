import { route } from '@/lib/http/route';
import { acknowledgeCautions } from '@/lib/publications/commands';
import { acknowledgeOperation } from '@/lib/publications/operations';

export const POST = route(acknowledgeOperation, acknowledgeCautions);
