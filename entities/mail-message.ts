import { defineEntity, type InferEntity, p } from '@mikro-orm/core';
import { createdAt, tenantColumns } from './columns';
import type { MailState, MailTemplate } from '../lib/email/schema';

export const MailMessage = defineEntity({
  name: 'MailMessage',
  tableName: 'mail_message',
  properties: {
    ...tenantColumns(),
    studyId: p.uuid().nullable(),
    alertId: p.uuid().nullable(),
    recipient: p.string(),
    recipientName: p.string(),
    subject: p.string(),
    template: p.json<MailTemplate>(),
    messageId: p.string(),
    state: p.string().$type<MailState>(),
    attempts: p.integer(),
    lastError: p.text().nullable(),
    createdAt: createdAt(),
    claimedAt: p.datetime().nullable(),
    sentAt: p.datetime().nullable(),
  },
});

export type MailMessageRow = InferEntity<typeof MailMessage>;
