export const MAIL_STATES = ['queued', 'sending', 'sent', 'bounced', 'failed'] as const;
export type MailState = (typeof MAIL_STATES)[number];

/** Which template a message is rendered with, and its values. No subject data and no site figures, in any of them. */
export type MailTemplate =
  | { kind: 'invitation'; organisationName: string; studyTitle: string | null; roleName: string; inviterName: string; url: string; expiresAt: string }
  | { kind: 'alert'; alertId: string; publicationId: string };
