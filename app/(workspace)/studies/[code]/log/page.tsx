import type { Metadata } from 'next';
import { redirect } from 'next/navigation';
import { NoPermission } from '@/components/shell/no-permission';
import { LogOverviewTable } from '@/components/site-log/log-overview';
import { EmptyState } from '@/components/ui/empty-state';
import { PageHead } from '@/components/ui/page-head';
import { Pagination } from '@/components/ui/pagination';
import { systemClock } from '@/lib/clock';
import { formatMonth, formatQuantity } from '@/lib/format';
import { readStudy } from '@/lib/http/page';
import { findOwnSiteCode, listLog } from '@/lib/site-log/queries';
import { overviewQuery } from '@/lib/site-log/schema';

export const metadata: Metadata = { title: 'Site log' };

interface Props {
  params: Promise<{ code: string }>;
  searchParams: Promise<Record<string, string | string[] | undefined>>;
}

export default async function LogPage({ params, searchParams }: Props) {
  const { code } = await params;
  const { page } = await searchParams;
  const parsed = overviewQuery.safeParse({ page: typeof page === 'string' ? page : 1 });
  const query = parsed.success ? parsed.data : overviewQuery.parse({});
  const read = await readStudy(code, 'site-log:read', async (scope, em) => ({
    ownSite: await findOwnSiteCode(scope, em),
    overview: await listLog(scope, { query }, { em, clock: systemClock }),
  }));
  if (!read.permitted) return <NoPermission detail={read.detail} code={code} />;
  const { ownSite, overview } = read.data;
  // A coordinator has one sheet: there is nothing to choose from.
  if (ownSite) redirect(`/studies/${code}/log/${encodeURIComponent(ownSite)}`);
  const last = overview.months.at(-1)!;
  const due = overview.items.filter(
    (site) => site.states.at(-1) !== 'reported' && site.states.at(-1) !== 'closed',
  ).length;
  return (
    <>
      <PageHead
        path={[{ label: code, href: `/studies/${code}` }, { label: 'Site log' }]}
        title="Site log"
        lead={
          overview.total === 0
            ? undefined
            : due === 0
              ? `Every site on this page has reported ${formatMonth(last)}.`
              : `${formatQuantity(due, 'site')} on this page ${due === 1 ? 'has' : 'have'} not reported ${formatMonth(last)} in full.`
        }
      />
      {overview.total === 0 ? (
        <EmptyState title="No site is open yet">
          The log begins with the month in which the first site opens.
        </EmptyState>
      ) : (
        <LogOverviewTable code={code} overview={overview} />
      )}
      <Pagination
        page={overview.page}
        pageSize={overview.size}
        total={overview.total}
        things="sites"
        hrefOf={(to) => `/studies/${code}/log?page=${to}`}
      />
    </>
  );
}
