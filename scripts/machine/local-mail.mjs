import { randomUUID } from 'node:crypto';
import { appendFileSync, existsSync, mkdirSync, readFileSync, renameSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { simpleParser } from 'mailparser';
import { SMTPServer } from 'smtp-server';

/**
 * A mail server on loopback that delivers into a folder: each message as it came, `<id>.eml`, and one line of JSON about it
 * in `index.jsonl`, oldest first.
 */
const folder = process.env.KALENDS_MAILBOX_FOLDER;
const index = join(folder, 'index.jsonl');
const KEPT = 500;
mkdirSync(folder, { recursive: true, mode: 0o700 });

async function keep(raw, envelope) {
  const { subject, messageId, from } = await simpleParser(raw, { skipHtmlToText: true, skipImageLinks: true });
  const id = randomUUID();
  // The message is whole before the index speaks of it.
  writeFileSync(join(folder, `${id}.part`), raw, { mode: 0o600 });
  renameSync(join(folder, `${id}.part`), join(folder, `${id}.eml`));
  const entry = {
    id,
    receivedAt: new Date().toISOString(),
    from: from?.text ?? '',
    to: envelope.rcptTo.map(({ address }) => address).join(', '),
    subject: subject ?? '',
    messageId: messageId ?? '',
  };
  appendFileSync(index, `${JSON.stringify(entry)}\n`, { mode: 0o600 });
}

/** The mailbox of a demonstration that runs for months does not grow without end. */
function forgetOldest() {
  if (!existsSync(index)) return;
  const lines = readFileSync(index, 'utf8').split('\n').filter(Boolean);
  if (lines.length <= KEPT) return;
  for (const line of lines.slice(0, -KEPT)) rmSync(join(folder, `${JSON.parse(line).id}.eml`), { force: true });
  writeFileSync(index, `${lines.slice(-KEPT).join('\n')}\n`, { mode: 0o600 });
}

forgetOldest();
const server = new SMTPServer({
  disabledCommands: ['AUTH', 'STARTTLS'],
  size: 10 * 1024 * 1024,
  onData(stream, session, done) {
    const parts = [];
    stream.on('data', (part) => parts.push(part));
    stream.on('end', () => keep(Buffer.concat(parts), session.envelope).then(() => done(null), done));
  },
});
server.on('error', (error) => process.stderr.write(`Local mail server: ${error.message}\n`));
server.listen(0, '127.0.0.1', () => process.send?.({ port: server.server.address().port }));
