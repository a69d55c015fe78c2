import { route } from '@/lib/http/route';
import { invitePerson } from '@/lib/people/commands';
import { invitePersonOperation } from '@/lib/people/operations';

export const POST = route(invitePersonOperation, invitePerson);
