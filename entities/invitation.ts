import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { createdAt, tenantColumns } from './columns';
import type { StudyRole } from '../lib/auth/permissions';

export const Invitation = defineEntity({
  name: 'Invitation',
  tableName: 'invitation',
  properties: {
    ...tenantColumns(),
    studyId: p.uuid().nullable(),
    siteId: p.uuid().nullable(),
    role: p.string().$type<StudyRole | 'owner'>(),
    email: p.string(),
    name: p.string(),
    tokenHash: p.string(),
    expiresAt: p.datetime(),
    acceptedAt: p.datetime().nullable(),
    revokedAt: p.datetime().nullable(),
    invitedBy: p.uuid(),
    createdAt: createdAt(),
  },
});

export type InvitationRow = InferEntity<typeof Invitation>;
