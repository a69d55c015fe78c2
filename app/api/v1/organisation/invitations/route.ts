import { route } from '@/lib/http/route';
import { inviteOwner } from '@/lib/people/commands';
import { inviteOwnerOperation } from '@/lib/people/operations';

export const POST = route(inviteOwnerOperation, inviteOwner);
