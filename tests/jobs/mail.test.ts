import { randomUUID } from 'node:crypto';
import { type AddressInfo, createServer } from 'node:net';
import { setTimeout as wait } from 'node:timers/promises';
import { type ParsedMail, simpleParser } from 'mailparser';
import { SMTPServer } from 'smtp-server';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { sendResetMail } from '@/lib/auth/reset-mail';
import { transact } from '@/lib/db/transaction';
import { queueMail } from '@/lib/email/commands';
import { deliverMail } from '@/lib/email/jobs';
import { env } from '@/lib/env';
import { QUEUES } from '@/lib/jobs/queues';
import { publishForecast } from '@/lib/publications/commands';
import { addAlertRule } from '@/lib/alerts/commands';
import { addPlan, addRun } from '@/tests/api/publications-scene';
import { shifted } from '@/tests/domain/publications-fixture';
import { createScene, type Scene } from '@/tests/support/scene';

/** A relay of our own: says what a test tells it to, and keeps what it took. */
const relay = {
  received: [] as ParsedMail[],
  refuse: null as { at: 'recipient' | 'data' | 'connect'; code: number } | null,
  sessions: 0,
};
const refusal = (code: number) => Object.assign(new Error(`refused with ${code}`), { responseCode: code });
const server = new SMTPServer({
  disabledCommands: ['AUTH', 'STARTTLS'],
  onConnect(_session, done) {
    relay.sessions += 1;
    done(relay.refuse?.at === 'connect' ? refusal(relay.refuse.code) : null);
  },
  onRcptTo(_address, _session, done) {
    done(relay.refuse?.at === 'recipient' ? refusal(relay.refuse.code) : null);
  },
  onData(stream, _session, done) {
    simpleParser(stream).then((mail) => {
      if (relay.refuse?.at === 'data') return done(refusal(relay.refuse.code));
      relay.received.push(mail);
      done(null);
    }, done);
  },
});
server.on('error', () => undefined);
await new Promise<void>((ready) => void server.listen(0, '127.0.0.1', ready));
// Before anything reads the configuration.
process.env.SMTP_URL = `smtp://127.0.0.1:${(server.server.address() as AddressInfo).port}`;

let scene: Scene;
beforeAll(async () => {
  scene = await createScene();
});
beforeEach(() => {
  relay.received.length = 0;
  relay.refuse = null;
  relay.sessions = 0;
});
afterAll(() => new Promise<void>((closed) => void server.close(() => closed())));

interface Row {
  id: string;
  state: string;
  attempts: number;
  last_error: string | null;
  message_id: string;
  template: { kind: string; url?: string };
}
const rows = <T>(sql: string, values: unknown[] = []): Promise<T[]> =>
  transact({ organisationId: scene.organisationId }, (em) => em.execute<T[]>(sql, values));
const rowOf = async (id: string): Promise<Row> =>
  (await rows<Row>(`select * from mail_message where id = ?`, [id]))[0]!;
const deliver = (id: string) => deliverMail({ organisationId: scene.organisationId, messageId: id });

async function invitation(change: { recipientName?: string; subject?: string } = {}): Promise<string> {
  const recipient = `${randomUUID()}@example.test`;
  await scene.act('manager', 'people:invite', (scope, context) =>
    queueMail(context, {
      organisationId: scope.organisationId,
      studyId: scope.studyId,
      alertId: null,
      recipient,
      recipientName: 'Nia Coe',
      subject: 'You are invited',
      template: {
        kind: 'invitation',
        organisationName: 'Hazelmoor Biometrics',
        studyTitle: 'KLD-900, ostrelin',
        roleName: 'sponsor viewer',
        inviterName: 'Marta Oyelaran',
        url: 'https://kalends.example/invitation/secret-token',
        expiresAt: '2027-04-13T09:30:00.000Z',
      },
      ...change,
    }),
  );
  return (await rows<{ id: string }>(`select id from mail_message where recipient = ?`, [recipient]))[0]!.id;
}

describe('a message', () => {
  it('is taken over with both parts and its headers, once', async () => {
    const id = await invitation();
    await deliver(id);
    await deliver(id);
    expect(relay.received).toHaveLength(1);
    const [mail] = relay.received;
    const row = await rowOf(id);
    expect(row).toMatchObject({ state: 'sent', attempts: 1, last_error: null });
    expect(mail!.messageId).toBe(row.message_id);
    expect(mail!.headers.get('auto-submitted')).toBe('auto-generated');
    expect(mail!.subject).toBe('You are invited');
    expect(mail!.text).toContain('https://kalends.example/invitation/secret-token');
    expect(mail!.html).toContain('Accept the invitation');
  });

  it('once sent, leaves no link that works in the database', async () => {
    const id = await invitation();
    expect((await rowOf(id)).template.url).toContain('secret-token');
    await deliver(id);
    expect((await rowOf(id)).template).toMatchObject({ kind: 'invitation', url: '' });
  });

  it('a line break in a name or subject never makes a header of its own', async () => {
    const id = await invitation({
      recipientName: 'Nia\r\nBcc: everyone@example.test',
      subject: 'Hello\r\nBcc: everyone@example.test\r\n\r\nbody',
    });
    await deliver(id);
    const [mail] = relay.received;
    expect(mail!.bcc).toBeUndefined();
    expect(mail!.headers.has('bcc')).toBe(false);
    expect(mail!.subject).toBe('Hello Bcc: everyone@example.test body');
  });

  it('a rolled-back transaction leaves neither row nor job', async () => {
    const count = async () => [
      (await rows(`select 1 from mail_message`)).length,
      (await rows(`select 1 from pgboss.job where name = 'mail-deliver'`)).length,
    ];
    const before = await count();
    const lost = scene.act('manager', 'people:invite', async (scope, context) => {
      await queueMail(context, {
        organisationId: scope.organisationId,
        studyId: scope.studyId,
        alertId: null,
        recipient: 'lost@example.test',
        recipientName: 'Lost',
        subject: 'Lost',
        template: { kind: 'alert', alertId: randomUUID(), publicationId: randomUUID() },
      });
      throw new Error('rolled back');
    });
    await expect(lost).rejects.toThrow('rolled back');
    expect(await count()).toEqual(before);
  });
});

describe('what the relay says', () => {
  for (const [at, code] of [
    ['recipient', 550],
    ['data', 554],
  ] as const) {
    it(`${code} to the ${at} is a bounce: on record, not tried again`, async () => {
      const id = await invitation();
      relay.refuse = { at, code };
      await deliver(id);
      expect(await rowOf(id)).toMatchObject({ state: 'bounced', attempts: 1 });
      expect((await rowOf(id)).last_error).toContain(String(code));
      relay.refuse = null;
      await deliver(id);
      expect(relay.received).toHaveLength(0);
    });
  }

  for (const [at, code] of [
    ['recipient', 421],
    ['recipient', 451],
    ['data', 451],
    ['connect', 421],
    ['connect', 554],
  ] as const) {
    it(`${code} at ${at} is tried again, under the same Message-ID`, async () => {
      const id = await invitation();
      relay.refuse = { at, code };
      await expect(deliver(id)).rejects.toThrow();
      expect(await rowOf(id)).toMatchObject({ state: 'queued', attempts: 1 });
      relay.refuse = null;
      await deliver(id);
      const row = await rowOf(id);
      expect(row).toMatchObject({ state: 'sent', attempts: 2, last_error: null });
      expect(relay.received.map((mail) => mail.messageId)).toEqual([row.message_id]);
    });
  }

  it('silence is tried again as well, within the time that the queue allows a job', async () => {
    const silent = createServer(() => undefined);
    await new Promise<void>((ready) => void silent.listen(0, '127.0.0.1', ready));
    const id = await invitation();
    const started = performance.now();
    const relayUrl = env().smtpUrl;
    env().smtpUrl = `smtp://127.0.0.1:${(silent.address() as AddressInfo).port}`;
    try {
      await expect(deliver(id)).rejects.toThrow();
    } finally {
      env().smtpUrl = relayUrl;
      silent.close();
    }
    expect(performance.now() - started).toBeLessThan(QUEUES['mail-deliver'].options.expireInSeconds * 1000);
    expect(await rowOf(id)).toMatchObject({ state: 'queued', attempts: 1 });
    await deliver(id);
    expect((await rowOf(id)).state).toBe('sent');
  });

  it('after as many attempts as the queue makes, the message is given up, on record', async () => {
    const id = await invitation();
    await rows(`update mail_message set attempts = ? where id = ?`, [QUEUES['mail-deliver'].options.retryLimit, id]);
    relay.refuse = { at: 'recipient', code: 451 };
    await expect(deliver(id)).rejects.toThrow();
    expect((await rowOf(id)).state).toBe('failed');
    expect((await rowOf(id)).template.url).toBe('');
  });
});

describe('a worker that dies', () => {
  it('between the relay’s word and the commit: the second copy has the same Message-ID', async () => {
    const id = await invitation();
    await deliver(id);
    // What a worker killed there leaves behind: a claim, grown old by the time the queue gives the job out again.
    await rows(
      `update mail_message set state = 'sending', sent_at = null, claimed_at = now() - interval '61 seconds' where id = ?`,
      [id],
    );
    await deliver(id);
    const row = await rowOf(id);
    expect(relay.received.map((mail) => mail.messageId)).toEqual([row.message_id, row.message_id]);
    expect(row).toMatchObject({ state: 'sent', attempts: 2 });
  });

  it('a fresh claim is another worker’s: nothing is sent beside it, and the job comes back', async () => {
    const id = await invitation();
    await rows(`update mail_message set state = 'sending', claimed_at = now() where id = ?`, [id]);
    await expect(deliver(id)).rejects.toThrow('in hand');
    expect(relay.received).toHaveLength(0);
    expect(await rowOf(id)).toMatchObject({ state: 'sending', attempts: 1 });
  });

  it('eight workers on one message send it once', async () => {
    const id = await invitation();
    await Promise.allSettled(Array.from({ length: 8 }, () => deliver(id)));
    expect(relay.received).toHaveLength(1);
    expect((await rowOf(id)).state).toBe('sent');
  });
});

describe('an alert', () => {
  it('goes from a publication to its readers’ mailboxes, and not to one who has left meanwhile', async () => {
    const planVersionId = await addPlan(scene);
    await addRun(scene, { planVersionId, number: 1 });
    await addRun(scene, { planVersionId, number: 2, change: (one) => shifted(one, 16) });
    await scene.act('statistician', 'alerts:change', (scope, context) =>
      addAlertRule(
        scope,
        {
          body: {
            milestoneCode: 'IA',
            condition: { kind: 'slips', days: 14 },
            recipients: { roles: ['sponsor', 'manager'], personIds: [] },
            isActive: true,
          },
        },
        context,
      ),
    );
    for (const runNumber of [1, 2]) {
      await scene.act('statistician', 'publications:publish', (scope, context) =>
        publishForecast(scope, { body: { runNumber, note: 'Eight sites open later.', confirm: true } }, context),
      );
    }
    await rows(`delete from study_member where person_id = ?`, [scene.people.manager.personId]);
    const queued = await rows<{ id: string; recipient: string }>(
      `select id, recipient from mail_message where alert_id is not null`,
    );
    expect(queued).toHaveLength(2);
    for (const { id } of queued) await deliver(id);
    expect(relay.received.map((mail) => [mail.to].flat()[0]!.text)).toEqual([
      `"${scene.people.sponsor.name}" <${scene.people.sponsor.email}>`,
    ]);
    const [mail] = relay.received;
    expect(mail!.subject).toMatch(/interim analysis now .*16 days later$/);
    expect(mail!.text).toContain('Eight sites open later.');
    const left = queued.find(({ recipient }) => recipient === scene.people.manager.email)!;
    expect(await rowOf(left.id)).toMatchObject({ state: 'failed' });
  });
});

describe('a password reset', () => {
  it('is done before the message leaves, and the message then comes', async () => {
    const started = performance.now();
    await sendResetMail(
      { name: 'Ines\r\nBcc: x@example.test', email: 'ines@example.test' },
      'https://kalends.example/reset/abc',
    );
    expect(performance.now() - started).toBeLessThan(50);
    expect(relay.sessions).toBe(0);
    for (let tries = 0; tries < 100 && relay.received.length === 0; tries += 1) await wait(50);
    const [mail] = relay.received;
    expect(mail!.text).toContain('https://kalends.example/reset/abc');
    expect(mail!.headers.has('bcc')).toBe(false);
  });
});
