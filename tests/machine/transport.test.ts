import { readdirSync, readFileSync } from 'node:fs';
import { createServer, type Server } from 'node:net';
import { join } from 'node:path';
import { simpleParser } from 'mailparser';
import { afterAll, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import { type LocalServer, startLocalServer } from './local-servers';

let relay: LocalServer;
const mail = {
  to: { name: 'Sabine, "the sponsor"', address: 'sabine@orrin.example' },
  subject: 'Interim analysis: Nov 2027 to Mar 2028, 80\u00a0%',
  text: 'Halina Wójt has logged March.',
  html: '<p>Halina Wójt has logged March.</p>',
  messageId: '<one@kalends.example>',
};

/** The environment is parsed once a process: a fresh copy of the module for each address of a relay. */
async function transportTo(smtpUrl: string): Promise<typeof import('@/lib/email/transport')> {
  vi.resetModules();
  process.env.SMTP_URL = smtpUrl;
  return import('@/lib/email/transport');
}

beforeAll(async () => {
  relay = await startLocalServer('local-mail', (folder) => ({ KALENDS_MAILBOX_FOLDER: folder }));
});
afterAll(() => relay.stop());

const mailbox = (): { id: string; to: string; subject: string; messageId: string }[] =>
  readFileSync(join(relay.folder, 'index.jsonl'), 'utf8')
    .trim()
    .split('\n')
    .map((line) => JSON.parse(line));

describe('a message that is sent', () => {
  it('arrives whole in the mailbox, to its one recipient, under its own Message-ID', async () => {
    const { sendMail } = await transportTo(`smtp://127.0.0.1:${relay.port}`);
    await sendMail({ ...mail, headers: { 'List-Unsubscribe': '<https://kalends.example/u/1>' } });
    const [entry] = mailbox().slice(-1);
    expect(entry).toMatchObject({ to: mail.to.address, subject: mail.subject, messageId: mail.messageId });
    const message = await simpleParser(readFileSync(join(relay.folder, `${entry?.id}.eml`)));
    expect(message.text?.trim()).toBe(mail.text);
    expect(message.html).toContain('Halina Wójt');
    expect(message.headers.get('auto-submitted')).toBe('auto-generated');
    expect(message.headers.has('list')).toBe(true);
  });

  it('carries no header that a name or a subject has smuggled in', async () => {
    const { sendMail } = await transportTo(`smtp://127.0.0.1:${relay.port}`);
    const to = { name: 'A\r\nBcc: thief@example.test', address: 'a@orrin.example' };
    await sendMail({ ...mail, to, subject: 'B\r\nBcc: thief@example.test', messageId: '<two@kalends.example>' });
    const [entry] = mailbox().slice(-1);
    expect(entry?.to).toBe('a@orrin.example');
    const message = await simpleParser(readFileSync(join(relay.folder, `${entry?.id}.eml`)));
    expect(message.headers.has('bcc')).toBe(false);
  });

  it('is not listed before it is whole', () => {
    const files = readdirSync(relay.folder);
    expect(files.filter((file) => file.endsWith('.part'))).toEqual([]);
    expect(files.filter((file) => file.endsWith('.eml'))).toHaveLength(mailbox().length);
  });
});

describe('a relay that does not take the message', () => {
  let answer = '';
  let server: Server;
  let url: string;

  beforeAll(async () => {
    server = createServer((socket) => {
      socket.on('error', () => {});
      socket.write('220 relay.example\r\n');
      socket.on('data', (data) => {
        const command = String(data).slice(0, 4).toUpperCase();
        if (command === 'QUIT') return socket.end('221 bye\r\n');
        return socket.write(command === 'RCPT' ? `${answer}\r\n` : '250 fine\r\n');
      });
    });
    await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
    const address = server.address();
    url = `smtp://127.0.0.1:${typeof address === 'object' ? address?.port : ''}`;
  });
  afterAll(() => new Promise((resolve) => server.close(resolve)));
  beforeEach(() => {
    answer = '';
  });

  it.each([
    ['550 5.1.1 no such mailbox', true],
    ['421 4.3.2 closing', false],
    ['451 4.7.1 greylisted', false],
  ])('%s: for good: %s', async (line, permanent) => {
    answer = line;
    const { sendMail, isPermanentRefusal } = await transportTo(url);
    const error: unknown = await sendMail(mail).catch((reason: unknown) => reason);
    expect(error).toBeInstanceOf(Error);
    expect(isPermanentRefusal(error)).toBe(permanent);
  });

  it('does not answer at all: an error, not for good', async () => {
    const { sendMail, isPermanentRefusal } = await transportTo('smtp://127.0.0.1:1');
    const error: unknown = await sendMail(mail).catch((reason: unknown) => reason);
    expect(error).toBeInstanceOf(Error);
    expect(isPermanentRefusal(error)).toBe(false);
  });
});
