import { createTransport } from 'nodemailer';
import { env } from '../env';

export interface OutgoingMail {
  /** One recipient a message: nobody learns who else was told. */
  to: { name: string; address: string };
  subject: string;
  text: string;
  html: string;
  /** Chosen by the caller and the same at every attempt, so that a message sent twice is seen to be one. */
  messageId: string;
  headers?: Record<string, string>;
}

/** Shorter in sum than the mail job's own limit, so that a hanging relay is an error of the attempt and not a lost worker. */
const TIMEOUTS = { dnsTimeout: 5_000, connectionTimeout: 10_000, greetingTimeout: 10_000, socketTimeout: 20_000 };

/** Hands one message to the relay; done when the relay has taken it over. */
export async function sendMail({ to, headers, ...content }: OutgoingMail): Promise<void> {
  const { smtpUrl, mailFrom } = env();
  if (!smtpUrl) throw new Error('SMTP_URL is not set: there is no mail relay to hand messages to.');
  // Nothing in a message may make the sender read a file or fetch an address.
  const closed = { disableFileAccess: true, disableUrlAccess: true };
  const transport = createTransport({ url: smtpUrl, ...TIMEOUTS, ...closed });
  try {
    await transport.sendMail({
      ...content,
      ...closed,
      from: mailFrom,
      to,
      headers: { 'Auto-Submitted': 'auto-generated', ...headers },
    });
  } finally {
    transport.close();
  }
}

/** What the relay refuses for good is this message; a refused log-in or greeting is ours to mend, and the mail can wait. */
const ABOUT_THE_MESSAGE = ['EENVELOPE', 'EMESSAGE'];

/** Whether the relay refused the message for good (5xx: a bounce) rather than for now (4xx, or no answer at all). */
export function isPermanentRefusal(error: unknown): boolean {
  if (!(error instanceof Error) || !('responseCode' in error) || !('code' in error)) return false;
  const { responseCode, code } = error;
  return typeof responseCode === 'number' && responseCode >= 500 && ABOUT_THE_MESSAGE.includes(String(code));
}
