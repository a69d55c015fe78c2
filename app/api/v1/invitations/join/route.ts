import { route } from '@/lib/http/route';
import { joinWithAccount } from '@/lib/people/commands';
import { joinOperation } from '@/lib/people/operations';

export const POST = route(joinOperation, joinWithAccount);
