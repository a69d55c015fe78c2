import { createReadStream } from 'node:fs';
import { readFile } from 'node:fs/promises';
import { join, resolve } from 'node:path';
import { simpleParser } from 'mailparser';
import { z } from 'zod';
import { env } from '../env';

/** One line of the local mail server's index; see `scripts/machine/local-mail.mjs`. */
const entrySchema = z.object({
  id: z.uuid(),
  receivedAt: z.iso.datetime(),
  from: z.string(),
  to: z.string(),
  subject: z.string(),
  messageId: z.string(),
});
export type MailboxEntry = z.infer<typeof entrySchema>;

export interface MailboxMessage extends MailboxEntry {
  headers: { name: string; value: string }[];
  text: string;
  html: string;
  /** Addresses of our own that the message leads to. */
  links: string[];
}

const SHOWN_HEADERS = ['message-id', 'auto-submitted', 'date'];

const folder = (): string => resolve(env().dataFolder, 'mailbox');

/** Open while developing, and in the demonstration on one's own machine; nowhere else is there such a page. */
export function hasMailbox(): boolean {
  return !env().production || env().demonstration;
}

/** What the local mail server took, newest first. */
export async function listMailbox(page: number, size: number): Promise<{ items: MailboxEntry[]; total: number }> {
  const lines = (await readFile(join(folder(), 'index.jsonl'), 'utf8').catch(() => '')).split('\n').filter(Boolean);
  const newest = lines.reverse().slice((page - 1) * size, page * size);
  return { items: newest.flatMap(readEntry), total: lines.length };
}

function readEntry(line: string): MailboxEntry[] {
  try {
    const parsed = entrySchema.safeParse(JSON.parse(line));
    return parsed.success ? [parsed.data] : [];
  } catch {
    // The server may be writing this very line.
    return [];
  }
}

/** One message in full; null where there is none of this name. */
export async function findMailboxMessage(id: string): Promise<MailboxMessage | null> {
  // Only a name that the server gives can become part of a path.
  if (!z.uuid().safeParse(id).success) return null;
  const source = createReadStream(join(folder(), `${id.toLowerCase()}.eml`));
  try {
    const mail = await simpleParser(source);
    const text = mail.text ?? '';
    const html = typeof mail.html === 'string' ? mail.html : '';
    return {
      id,
      receivedAt: (mail.date ?? new Date(0)).toISOString(),
      from: mail.from?.text ?? '',
      to: [mail.to ?? []]
        .flat()
        .map((one) => one.text)
        .join(', '),
      subject: mail.subject ?? '',
      messageId: mail.messageId ?? '',
      headers: mail.headerLines
        .filter(({ key }) => SHOWN_HEADERS.includes(key))
        .map(({ line }) => {
          const [name = '', ...value] = line.split(':');
          return { name, value: value.join(':').trim() };
        }),
      text,
      html,
      links: ownLinks(text),
    };
  } catch (error) {
    if (error instanceof Error && 'code' in error && error.code === 'ENOENT') return null;
    throw error;
  } finally {
    source.destroy();
  }
}

function ownLinks(text: string): string[] {
  const found = text.match(/https?:\/\/[^\s<>"')\]]+/g) ?? [];
  return [...new Set(found)].filter(
    (link) => URL.canParse(link) && env().trustedOrigins.includes(new URL(link).origin),
  );
}
