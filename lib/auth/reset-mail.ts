import { createElement } from 'react';
import { randomUUID } from 'node:crypto';
import { setTimeout as wait } from 'node:timers/promises';
import { messageIdOf } from '../email/message-id';
import { renderMail } from '../email/render';
import { ResetMail } from '../email/templates/reset-mail';
import { isPermanentRefusal, sendMail } from '../email/transport';
import { log } from '../log';

/** The first wait lets the reply go first; the later ones give a relay that was busy time to come back. */
const WAITS_MS = [250, 5_000, 30_000];

interface Recipient {
  name: string;
  email: string;
}

/**
 * A reset belongs to no organisation, so it has no outbox row: it goes straight to the relay. It is done at once and the
 * message leaves after the reply, so that a known address is answered exactly as fast as an unknown one.
 */
export async function sendResetMail(user: Recipient, url: string): Promise<void> {
  void deliver(user, url);
}

async function deliver(user: Recipient, url: string): Promise<void> {
  const messageId = messageIdOf(randomUUID());
  for (const [place, milliseconds] of WAITS_MS.entries()) {
    await wait(milliseconds);
    try {
      const parts = await renderMail(createElement(ResetMail, { name: user.name, url }));
      const to = { name: user.name, address: user.email };
      return await sendMail({ to, subject: 'Choose a new password for Kalends', messageId, ...parts });
    } catch (error) {
      const last = isPermanentRefusal(error) || place === WAITS_MS.length - 1;
      log[last ? 'error' : 'warn']({ err: error }, last ? 'reset mail not sent' : 'reset mail will be tried again');
      if (last) return;
    }
  }
}
