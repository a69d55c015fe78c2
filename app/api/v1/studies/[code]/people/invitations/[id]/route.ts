import { route } from '@/lib/http/route';
import { revokeInvitation } from '@/lib/people/commands';
import { revokeInvitationOperation } from '@/lib/people/operations';

export const DELETE = route(revokeInvitationOperation, revokeInvitation);
