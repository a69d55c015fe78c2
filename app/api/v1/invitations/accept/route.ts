import { route } from '@/lib/http/route';
import { acceptInvitation } from '@/lib/people/commands';
import { acceptInvitationOperation } from '@/lib/people/operations';

export const POST = route(acceptInvitationOperation, acceptInvitation);
