export const MAIL_STATES = ['queued', 'sending', 'sent', 'bounced', 'failed'] as const;
export type MailState = (typeof MAIL_STATES)[number];

/** Which template a message is rendered with, and its values. No subject data and no site figures, in any of them. */
export type MailTemplate =
  | {
      kind: 'invitation';
      organisationName: string;
      studyTitle: string | null;
      roleName: string;
      inviterName: string;
      /** Emptied once the message has left: a link that works is kept no longer than it has to be. */
      url: string;
      expiresAt: string;
    }
  | { kind: 'alert'; alertId: string; publicationId: string };

/** What one message says, in both its parts. */
export interface RenderedMail {
  html: string;
  text: string;
}
