import { randomUUID } from 'node:crypto';
import type { CommandContext } from '../audit/record';
import { enqueue } from '../jobs/enqueue';
import { messageIdOf } from './message-id';
import type { MailTemplate } from './schema';

export interface MailToQueue {
  organisationId: string;
  studyId: string | null;
  /** With an alert, one message per alert and recipient; asking again changes nothing. */
  alertId: string | null;
  recipient: string;
  recipientName: string;
  subject: string;
  template: MailTemplate;
}

/** Puts a message on its way, in the transaction of what it tells: rolled back, nobody hears of it. */
export async function queueMail(context: CommandContext, mail: MailToQueue): Promise<void> {
  const id = randomUUID();
  const recipient = mail.recipient.trim().toLowerCase();
  const [made] = await context.em.execute<{ id: string }[]>(
    `insert into mail_message (id, organisation_id, study_id, alert_id, recipient, recipient_name, subject, template, message_id, state, attempts, created_at)
     values (?, ?, ?, ?, ?, ?, ?, ?::jsonb, ?, 'queued', 0, ?) on conflict (organisation_id, alert_id, recipient) do nothing returning id`,
    [
      id,
      mail.organisationId,
      mail.studyId,
      mail.alertId,
      recipient,
      oneLine(mail.recipientName),
      oneLine(mail.subject),
      JSON.stringify(mail.template),
      messageIdOf(mail.alertId ? `${mail.alertId} ${recipient}` : id),
      context.clock.now(),
    ],
  );
  if (made) await enqueue(context.em, 'mail-deliver', { organisationId: mail.organisationId, messageId: id });
}

/** A header is one line: what a name or a title brings along in control characters becomes a space. */
export function oneLine(text: string): string {
  return text
    .replace(/[\p{Cc}\p{Zl}\p{Zp}]+/gu, ' ')
    .replace(/ {2,}/g, ' ')
    .trim()
    .slice(0, 200);
}
