import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { callOperation } from '../http/client';
import {
  endMembershipOperation,
  inviteOwnerOperation,
  invitePersonOperation,
  listPeopleOperation,
  revokeInvitationOperation,
} from './operations';
import type { InvitePersonBody, People } from './schema';

const peopleKey = (code: string) => ['people', code] as const;

export function usePeople(code: string, initialData: People) {
  return useQuery({
    queryKey: peopleKey(code),
    queryFn: ({ signal }) => callOperation(listPeopleOperation, { params: { code }, signal }),
    initialData,
    staleTime: 5_000,
  });
}

function useRefresh(code: string) {
  const client = useQueryClient();
  return () => client.invalidateQueries({ queryKey: peopleKey(code) });
}

export function useInvitePerson(code: string) {
  return useMutation({
    mutationFn: (body: InvitePersonBody) => callOperation(invitePersonOperation, { params: { code }, body }),
    onSuccess: useRefresh(code),
  });
}

export function useRevokeInvitation(code: string) {
  return useMutation({
    mutationFn: (id: string) => callOperation(revokeInvitationOperation, { params: { code, id } }),
    onSuccess: useRefresh(code),
  });
}

export function useEndMembership(code: string) {
  return useMutation({
    mutationFn: (id: string) => callOperation(endMembershipOperation, { params: { code, id } }),
    onSuccess: useRefresh(code),
  });
}

export function useInviteOwner() {
  return useMutation({
    mutationFn: (body: { name: string; email: string }) => callOperation(inviteOwnerOperation, { params: {}, body }),
  });
}
