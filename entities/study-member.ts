import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { createdAt, tenantColumns } from './columns';
import type { StudyRole } from '../lib/auth/permissions';

export const StudyMember = defineEntity({
  name: 'StudyMember',
  tableName: 'study_member',
  properties: {
    ...tenantColumns(),
    studyId: p.uuid(),
    personId: p.uuid(),
    role: p.string().$type<StudyRole>(),
    siteId: p.uuid().nullable(),
    createdAt: createdAt(),
  },
});

export type StudyMemberRow = InferEntity<typeof StudyMember>;
