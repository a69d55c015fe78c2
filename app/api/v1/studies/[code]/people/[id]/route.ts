import { route } from '@/lib/http/route';
import { endMembership } from '@/lib/people/commands';
import { endMembershipOperation } from '@/lib/people/operations';

export const DELETE = route(endMembershipOperation, endMembership);
