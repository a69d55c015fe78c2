import { z } from 'zod';
import { defineOperation } from '../http/operation';
import { nothing, studyParams } from '../http/params';
import { acceptInvitationBody, inviteOwnerBody, invitePersonBody, joinBody, peopleSchema } from './schema';

const done = z.strictObject({ id: z.uuid() });

export const listPeopleOperation = defineOperation({
  method: 'GET',
  path: '/api/v1/studies/{code}/people',
  summary: 'Who has a role in the study, and who is invited',
  access: { kind: 'study', action: 'people:read' },
  params: studyParams,
  query: nothing,
  body: nothing,
  reply: peopleSchema,
});

export const invitePersonOperation = defineOperation({
  method: 'POST',
  path: '/api/v1/studies/{code}/people/invitations',
  summary: 'Invite a person to the study by e-mail',
  access: { kind: 'study', action: 'people:invite' },
  params: studyParams,
  query: nothing,
  body: invitePersonBody,
  reply: done,
  status: 201,
});

export const revokeInvitationOperation = defineOperation({
  method: 'DELETE',
  path: '/api/v1/studies/{code}/people/invitations/{id}',
  summary: 'Take an invitation back',
  access: { kind: 'study', action: 'people:invite' },
  params: studyParams.extend({ id: z.uuid() }),
  query: nothing,
  body: nothing,
  reply: done,
});

export const endMembershipOperation = defineOperation({
  method: 'DELETE',
  path: '/api/v1/studies/{code}/people/{id}',
  summary: 'End a person’s access to the study',
  access: { kind: 'study', action: 'people:invite' },
  params: studyParams.extend({ id: z.uuid() }),
  query: nothing,
  body: nothing,
  reply: done,
});

export const inviteOwnerOperation = defineOperation({
  method: 'POST',
  path: '/api/v1/organisation/invitations',
  summary: 'Invite a further owner of the organisation',
  access: { kind: 'organisation', action: 'organisation:invite' },
  params: nothing,
  query: nothing,
  body: inviteOwnerBody,
  reply: done,
  status: 201,
});

export const acceptInvitationOperation = defineOperation({
  method: 'POST',
  path: '/api/v1/invitations/accept',
  summary: 'Make an account from an invitation',
  access: { kind: 'public' },
  params: nothing,
  query: nothing,
  body: acceptInvitationBody,
  reply: z.strictObject({ email: z.string() }),
  status: 201,
});

export const joinOperation = defineOperation({
  method: 'POST',
  path: '/api/v1/invitations/join',
  summary: 'Accept an invitation with the account one has',
  access: { kind: 'person' },
  params: nothing,
  query: nothing,
  body: joinBody,
  reply: z.strictObject({ email: z.string() }),
});
