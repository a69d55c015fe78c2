import type { Metadata } from 'next';
import { AuditFilter } from '@/components/audit/audit-filter';
import { AuditTable } from '@/components/audit/audit-table';
import { NoPermission } from '@/components/shell/no-permission';
import { EmptyState } from '@/components/ui/empty-state';
import { Notice } from '@/components/ui/notice';
import { PageHead } from '@/components/ui/page-head';
import { Pagination } from '@/components/ui/pagination';
import { listAudit } from '@/lib/audit/queries';
import { auditQuery } from '@/lib/audit/schema';
import { formatQuantity } from '@/lib/format';
import { readStudy } from '@/lib/http/page';

export const metadata: Metadata = { title: 'Audit' };

type Search = Record<string, string | undefined>;

export default async function AuditPage({
  params,
  searchParams,
}: {
  params: Promise<{ code: string }>;
  searchParams: Promise<Search>;
}) {
  const { code } = await params;
  const typed = Object.fromEntries(
    Object.entries(await searchParams).filter(([, value]) => typeof value === 'string' && value !== ''),
  );
  const parsed = auditQuery.safeParse(typed);
  const query = parsed.success ? parsed.data : auditQuery.parse({});
  const read = await readStudy(code, 'audit:read', (scope, em) => listAudit(scope, { query }, { em }));
  if (!read.permitted) return <NoPermission detail={read.detail} code={code} />;
  const { items, total, page, size } = read.data;
  return (
    <>
      <PageHead
        path={[{ label: code, href: `/studies/${code}` }, { label: 'Audit' }]}
        title="Audit"
        lead={`${formatQuantity(total, 'entry', 'entries')}, newest first. Each is chained to the one before it; none can be changed or removed.`}
      />
      <AuditFilter key={JSON.stringify(typed)} values={typed} />
      {!parsed.success && (
        <Notice tone="stop" title="The filter was not understood">
          {parsed.error.issues.map((issue) => issue.message).join(' ')}
        </Notice>
      )}
      {items.length === 0 ? (
        <EmptyState title="No entry matches">Widen the dates or leave the person out.</EmptyState>
      ) : (
        <AuditTable entries={items} />
      )}
      <Pagination
        page={page}
        pageSize={size}
        total={total}
        things="entries"
        hrefOf={(to) => `?${new URLSearchParams({ ...typed, page: String(to) })}`}
      />
    </>
  );
}
