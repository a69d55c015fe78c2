import type { Metadata } from 'next';
import Link from 'next/link';
import { notFound } from 'next/navigation';
import { PageFrame } from '@/components/shell/page-frame';
import { RunningHead } from '@/components/shell/running-head';
import { EmptyState } from '@/components/ui/empty-state';
import { PageHead } from '@/components/ui/page-head';
import { Pagination } from '@/components/ui/pagination';
import { Cell, HeadCell, Row, RowHead, Table, TableBody, TableHead } from '@/components/ui/table';
import { hasMailbox, listMailbox } from '@/lib/email/mailbox';
import { formatInstant } from '@/lib/format';

export const metadata: Metadata = { title: 'Mailbox' };
// What lies in the folder is asked anew at each visit.
export const dynamic = 'force-dynamic';

const SIZE = 50;

/** The mail that the product sent on this machine, where no real mail server stands behind it. */
export default async function MailboxPage({ searchParams }: { searchParams: Promise<{ page?: string | string[] }> }) {
  if (!hasMailbox()) notFound();
  const page = Math.min(10_000, Math.max(1, Math.trunc(Number((await searchParams).page)) || 1));
  const { items, total } = await listMailbox(page, SIZE);
  return (
    <>
      <RunningHead links={[{ label: 'Sign in', href: '/sign-in' }]} />
      <PageFrame forecast={false}>
        <PageHead
          title="Mailbox"
          lead="Every message that this machine has sent. Nothing leaves it: a mail server of its own takes them all."
        />
        {total === 0 ? (
          <EmptyState title="No mail yet">
            <p>An invitation, a forgotten password or an alert brings one.</p>
          </EmptyState>
        ) : (
          <Table caption="Messages, newest first">
            <TableHead>
              <Row>
                <HeadCell>Subject</HeadCell>
                <HeadCell>To</HeadCell>
                <HeadCell>When, UTC</HeadCell>
              </Row>
            </TableHead>
            <TableBody>
              {items.map((mail) => (
                <Row key={mail.id}>
                  <RowHead>
                    <Link href={`/dev/mailbox/${mail.id}`}>{mail.subject || 'without a subject'}</Link>
                  </RowHead>
                  <Cell className="break-all">{mail.to}</Cell>
                  <Cell className="whitespace-nowrap">{formatInstant(mail.receivedAt)}</Cell>
                </Row>
              ))}
            </TableBody>
          </Table>
        )}
        <Pagination page={page} pageSize={SIZE} total={total} things="messages" hrefOf={(to) => `?page=${to}`} />
      </PageFrame>
    </>
  );
}
