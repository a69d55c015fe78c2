import { appendFileSync, mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { findMailboxMessage, hasMailbox, listMailbox } from '@/lib/email/mailbox';
import { env } from '@/lib/env';

const data = mkdtempSync(join(tmpdir(), 'kalends-mailbox-'));
const before = { ...env() };
beforeAll(() => {
  mkdirSync(join(data, 'mailbox'));
  env().dataFolder = data;
});
afterAll(() => {
  Object.assign(env(), before);
  rmSync(data, { recursive: true });
});

function receive(subject: string, body: string): string {
  const id = randomUUID();
  const lines = [
    'From: Kalends <alerts@kalends.example>',
    'To: nia@example.test',
    `Subject: ${subject}`,
    'Auto-Submitted: auto-generated',
  ];
  writeFileSync(join(data, 'mailbox', `${id}.eml`), [...lines, 'Content-Type: text/plain', '', body].join('\r\n'));
  const entry = {
    id,
    receivedAt: '2027-04-06T10:00:00.000Z',
    from: 'Kalends',
    to: 'nia@example.test',
    subject,
    messageId: '<a@b>',
  };
  appendFileSync(join(data, 'mailbox', 'index.jsonl'), `${JSON.stringify(entry)}\n`);
  return id;
}

describe('the mailbox of this machine', () => {
  it('is empty where nothing was sent', async () => {
    expect(await listMailbox(1, 50)).toEqual({ items: [], total: 0 });
  });

  it('lists the newest first, page by page, and passes over a line that is being written', async () => {
    for (const subject of ['one', 'two', 'three']) receive(subject, 'Hello.');
    expect((await listMailbox(1, 2)).items.map(({ subject }) => subject)).toEqual(['three', 'two']);
    expect((await listMailbox(2, 2)).items.map(({ subject }) => subject)).toEqual(['one']);
    appendFileSync(join(data, 'mailbox', 'index.jsonl'), '{"id":"half');
    expect((await listMailbox(1, 50)).items).toHaveLength(3);
  });

  it('shows a message with the links that lead to ourselves, and no other', async () => {
    const own = `${env().origin}/invitation/abc`;
    const mail = await findMailboxMessage(
      receive('link', `Accept ${own}\r\nor https://elsewhere.example/invitation/abc`),
    );
    expect(mail).toMatchObject({ subject: 'link', links: [own] });
    expect(mail!.headers).toContainEqual({ name: 'Auto-Submitted', value: 'auto-generated' });
  });

  it('opens nothing but messages', async () => {
    writeFileSync(join(data, 'secret.eml'), 'Subject: secret\r\n\r\nsecret');
    for (const id of ['../secret', '..%2Fsecret', 'index.jsonl', '', randomUUID()]) {
      expect(await findMailboxMessage(id)).toBeNull();
    }
  });

  it('is there while developing and in the demonstration, and nowhere else', () => {
    const at = (production: boolean, demonstration: boolean) => {
      Object.assign(env(), { production, demonstration });
      return hasMailbox();
    };
    expect([at(false, false), at(true, true), at(true, false)]).toEqual([true, true, false]);
  });
});
