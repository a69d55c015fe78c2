import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { PageFrame } from '@/components/shell/page-frame';
import { RunningHead } from '@/components/shell/running-head';
import { PageHead } from '@/components/ui/page-head';
import { Section } from '@/components/ui/section';
import { findMailboxMessage, hasMailbox } from '@/lib/email/mailbox';

export const metadata: Metadata = { title: 'Message' };
export const dynamic = 'force-dynamic';

/** One message, both its parts. The HTML stands in a frame that runs no script and leads nowhere; its links are beside it. */
export default async function MessagePage({ params }: { params: Promise<{ id: string }> }) {
  if (!hasMailbox()) notFound();
  const mail = await findMailboxMessage((await params).id);
  if (!mail) notFound();
  const lines = [{ name: 'From', value: mail.from }, { name: 'To', value: mail.to }, ...mail.headers];
  return (
    <>
      <RunningHead links={[{ label: 'Sign in', href: '/sign-in' }]} />
      <PageFrame forecast={false}>
        <PageHead path={[{ label: 'Mailbox', href: '/dev/mailbox' }]} title={mail.subject || 'Without a subject'} />
        <dl className="grid grid-cols-[auto_1fr] gap-x-5 gap-y-1 text-13">
          {lines.map(({ name, value }) => (
            <div key={name} className="contents">
              <dt className="text-ink-soft">{name}</dt>
              <dd className="break-all">{value}</dd>
            </div>
          ))}
        </dl>
        {mail.links.length > 0 && (
          <Section title="Where it leads">
            <ul>
              {mail.links.map((link) => (
                <li key={link} className="break-all">
                  <a href={link}>{link}</a>
                </li>
              ))}
            </ul>
          </Section>
        )}
        <div className="gap-x-8 md:grid md:grid-cols-[minmax(0,1fr)_580px]">
          <Section title="As it looks">
            {mail.html ? (
              <iframe
                title="The message’s HTML part"
                sandbox=""
                srcDoc={mail.html}
                className="h-[900px] w-full border border-rule-strong"
              />
            ) : (
              <p>It has no HTML part.</p>
            )}
          </Section>
          <Section title="The same in plain text">
            <pre className="text-13 whitespace-pre-wrap">{mail.text}</pre>
          </Section>
        </div>
      </PageFrame>
    </>
  );
}
