import type { EntityManager } from '@mikro-orm/postgresql';
import { createElement, type ReactElement } from 'react';
import { MailMessage, type MailMessageRow } from '../../entities/mail-message';
import { systemClock } from '../clock';
import { transact } from '../db/transaction';
import { type JobPayload, QUEUES } from '../jobs/queues';
import { alertMessage } from './alert-message';
import { renderMail } from './render';
import type { MailState, MailTemplate, RenderedMail } from './schema';
import { InvitationMail } from './templates/invitation-mail';
import { isPermanentRefusal, sendMail } from './transport';

type Payload = JobPayload<'mail-deliver'>;

const { expireInSeconds, retryLimit } = QUEUES['mail-deliver'].options;

/** A claim this old is a dead worker's: the queue gives the job out again only after its own limit. */
const CLAIM_SECONDS = expireInSeconds - 5;

interface Claimed extends RenderedMail {
  to: { name: string; address: string };
  subject: string;
  messageId: string;
  attempt: number;
}

/**
 * Hands one message to the relay. Claimed in one transaction, sent, settled in another: between the relay's word and our
 * commit a killed worker sends again, under the same Message-ID; a message that is settled is never sent again.
 */
export async function deliverMail(payload: Payload): Promise<void> {
  const claimed = await claim(payload);
  if (!claimed) return;
  const { attempt, ...mail } = claimed;
  try {
    await sendMail(mail);
  } catch (error) {
    if (isPermanentRefusal(error)) return settle(payload, { state: 'bounced', error });
    await settle(payload, { state: attempt > retryLimit ? 'failed' : 'queued', error });
    throw error;
  }
  await settle(payload, { state: 'sent' });
}

/** Null where there is nothing to send any more. */
async function claim({ organisationId, messageId }: Payload): Promise<Claimed | null> {
  const outcome = await transact({ organisationId }, async (em) => {
    // By the database's clock, which all workers share.
    const [lock] = await em.execute<{ in_hand: boolean; now: Date }[]>(
      `select now() as now, state = 'sending' and claimed_at > now() - make_interval(secs => ?) as in_hand from mail_message
        where organisation_id = ? and id = ? for update`,
      [CLAIM_SECONDS, organisationId, messageId],
    );
    if (!lock) return null;
    const mail = await em.findOneOrFail(MailMessage, { organisationId, id: messageId });
    if (mail.state !== 'queued' && mail.state !== 'sending') return null;
    mail.attempts += 1;
    if (lock.in_hand) return 'in hand' as const;
    if (!(await mayStillBeTold(em, mail))) {
      Object.assign(mail, { state: 'failed', lastError: 'Not sent: this person’s access to the study has ended.' });
      return null;
    }
    const parts = await renderMail(await messageOf(em, mail));
    Object.assign(mail, { state: 'sending', claimedAt: new Date(lock.now) });
    const { recipient, recipientName, subject, attempts } = mail;
    const to = { name: recipientName, address: recipient };
    return { ...parts, to, subject, messageId: mail.messageId, attempt: attempts };
  });
  // Thrown outside, so that the attempt stays counted; the queue comes back when the claim has aged.
  if (outcome === 'in hand') throw new Error('Another worker has this message in hand.');
  return outcome;
}

/** An alert is for readers of the study: who has lost that role since it was queued is not told. */
async function mayStillBeTold(em: EntityManager, mail: MailMessageRow): Promise<boolean> {
  if (mail.template.kind !== 'alert') return true;
  const rows = await em.execute(
    `select 1 from study_member m join person p on p.id = m.person_id
      where m.organisation_id = ? and m.study_id = ? and lower(p.email) = ? and m.role <> 'coordinator'`,
    [mail.organisationId, mail.studyId, mail.recipient],
  );
  return rows.length > 0;
}

async function messageOf(em: EntityManager, mail: MailMessageRow): Promise<ReactElement> {
  const { template, organisationId, recipient } = mail;
  if (template.kind === 'alert') return alertMessage(em, { organisationId, alertId: template.alertId });
  const { kind: _, ...words } = template;
  return createElement(InvitationMail, { ...words, recipient });
}

interface Outcome {
  state: Exclude<MailState, 'sending'>;
  error?: unknown;
}

async function settle({ organisationId, messageId }: Payload, { state, error }: Outcome): Promise<void> {
  await transact({ organisationId }, async (em) => {
    const mail = await em.findOneOrFail(MailMessage, { organisationId, id: messageId });
    mail.state = state;
    mail.lastError = error === undefined ? null : errorLine(error);
    if (state === 'sent') mail.sentAt = systemClock.now();
    if (state !== 'queued') mail.template = spent(mail.template);
  });
}

const errorLine = (error: unknown): string =>
  (error instanceof Error ? error.message : String(error)).replace(/\s+/g, ' ').slice(0, 500);

/** A link that works has no business in the database once its message has left. */
function spent(template: MailTemplate): MailTemplate {
  return template.kind === 'invitation' ? { ...template, url: '' } : template;
}
