import type { Metadata } from 'next';
import Link from 'next/link';
import { NoPermission } from '@/components/shell/no-permission';
import { AddSite } from '@/components/sites/add-site';
import { OpeningWindows } from '@/components/sites/opening-windows';
import { SiteBoard } from '@/components/sites/site-board';
import { SiteFilter } from '@/components/sites/site-filter';
import { EmptyState } from '@/components/ui/empty-state';
import { type HeadFigure, PageHead } from '@/components/ui/page-head';
import { Pagination } from '@/components/ui/pagination';
import { Section } from '@/components/ui/section';
import { systemClock } from '@/lib/clock';
import { countryName } from '@/lib/countries';
import { formatCount, formatDate, formatQuantity } from '@/lib/format';
import { readStudy } from '@/lib/http/page';
import { listSites, listWindows, summariseSites } from '@/lib/sites/queries';
import { sitesQuery, type SitesQuery, type SitesSummary } from '@/lib/sites/schema';

export const metadata: Metadata = { title: 'Sites' };

interface Props {
  params: Promise<{ code: string }>;
  searchParams: Promise<Record<string, string | string[] | undefined>>;
}

export default async function SitesPage({ params, searchParams }: Props) {
  const { code } = await params;
  // An address with a filter that is none shows all sites.
  const parsed = sitesQuery.safeParse(await searchParams);
  const query = parsed.success ? parsed.data : sitesQuery.parse({});
  const read = await readStudy(code, 'sites:read', async (scope, em) => {
    const context = { em, clock: systemClock };
    return {
      page: await listSites(scope, { query }, context),
      summary: await summariseSites(scope, context),
      windows: await listWindows(scope, context),
    };
  });
  if (!read.permitted) return <NoPermission detail={read.detail} code={code} />;
  const { page, summary, windows } = read.data;
  const path = [{ label: code, href: `/studies/${code}` }, { label: 'Sites' }];
  const upload = <Link href={`/studies/${code}/sites/upload`}>Upload a site list</Link>;
  if (summary.total === 0) {
    return (
      <>
        <PageHead path={path} title="Sites" />
        <EmptyState
          title="No sites yet"
          action={
            <>
              <AddSite code={code} />
              {upload}
            </>
          }
        >
          Add them one by one, or upload the list: code, name, city, country, and the planned window or the day of
          activation.
        </EmptyState>
      </>
    );
  }
  return (
    <>
      <PageHead
        path={path}
        title="Sites"
        figure={figureOf(summary)}
        action={
          <>
            <AddSite code={code} />
            <p className="text-13">{upload}</p>
          </>
        }
      />
      <Section
        title="By code"
        aside={`Months missing are counted from the activation to the last month over, ${formatDate(summary.today)}`}
      >
        <SiteFilter code={code} query={query} countries={summary.countries} />
        <SiteBoard
          code={code}
          sites={page.items}
          countryNames={Object.fromEntries(summary.countries.map((country) => [country, countryName(country)]))}
        />
        <Pagination
          page={page.page}
          pageSize={page.size}
          total={page.total}
          things="sites"
          hrefOf={(to) => `/studies/${code}/sites?${addressOf(query, to)}`}
        />
      </Section>
      {windows.total > 0 && (
        <Section
          title="Still to open"
          aside={`Earliest, likely and latest day; the upright line is today, ${formatDate(windows.today)}`}
        >
          <OpeningWindows windows={windows} />
          {windows.total > windows.items.length && (
            <p className="mt-2 text-13 text-ink-soft">
              {formatCount(windows.total - windows.items.length)} more are to open later; find them above by their
              status.
            </p>
          )}
        </Section>
      )}
    </>
  );
}

function figureOf({ total, byStatus, countries, randomised }: SitesSummary): HeadFigure {
  return {
    label: (
      <>
        <b>Open</b>, in {formatQuantity(countries.length, 'country', 'countries')}
      </>
    ),
    value: `${formatCount(byStatus.open)} of ${formatQuantity(total, 'site')}`,
    below: (
      <p>
        {formatCount(byStatus['to-open'])} to come, {formatCount(byStatus.closed)} closed
        {byStatus.overdue > 0 && (
          <>
            , <b className="text-caution">{formatCount(byStatus.overdue)} overdue</b>
          </>
        )}
        . Together {formatQuantity(randomised, 'patient')}.
      </p>
    ),
  };
}

function addressOf({ search, country, status }: SitesQuery, page: number): string {
  const parts = Object.entries({ search, country, status, page: String(page) }).filter(
    (entry): entry is [string, string] => entry[1] !== undefined,
  );
  return new URLSearchParams(parts).toString();
}
