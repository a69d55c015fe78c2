import type { Metadata } from 'next';
import Link from 'next/link';
import { RunDone } from '@/components/forecasts/run-done';
import { RunList } from '@/components/forecasts/run-list';
import { RunStopped } from '@/components/forecasts/run-stopped';
import { RunWatch } from '@/components/forecasts/run-watch';
import { NoPermission } from '@/components/shell/no-permission';
import { ButtonLink } from '@/components/ui/button-link';
import { EmptyState } from '@/components/ui/empty-state';
import { Notice } from '@/components/ui/notice';
import { PageHead } from '@/components/ui/page-head';
import { Pagination } from '@/components/ui/pagination';
import { Section } from '@/components/ui/section';
import { calendarDay, systemClock } from '@/lib/clock';
import { daysApart } from '@/lib/dates';
import { formatDate, formatQuantity } from '@/lib/format';
import { findLatestRuns, getRun, listRuns } from '@/lib/forecasts/queries';
import { pageQuery } from '@/lib/http/params';
import { readStudy } from '@/lib/http/page';
import { countReaders } from '@/lib/publications/queries';
import { STALE_AFTER_DAYS } from '@/lib/publications/rules';

export const metadata: Metadata = { title: 'Forecasts' };

const SIZE = 20;

interface Props {
  params: Promise<{ code: string }>;
  searchParams: Promise<Record<string, string | string[] | undefined>>;
}

/** The newest forecast, what is under way, and the runs before. */
export default async function ForecastsPage({ params, searchParams }: Props) {
  const { code } = await params;
  const asked = pageQuery.safeParse({ page: (await searchParams).page, size: SIZE });
  const query = asked.success ? asked.data : { page: 1, size: SIZE };
  const read = await readStudy(code, 'forecasts:read', async (scope, em) => {
    const { latest, done } = await findLatestRuns(scope, em);
    const viewOf = (number: number) => getRun(scope, { params: { number } }, { em });
    return {
      done: done === null ? null : await viewOf(done),
      latest: latest === null || latest === done ? null : await viewOf(latest),
      today: calendarDay(systemClock.now()),
      runs: await listRuns(scope, { query }, { em }),
      readers: await countReaders(scope, em),
    };
  });
  if (!read.permitted) return <NoPermission detail={read.detail} code={code} />;
  const { done, latest, runs, readers, today } = read.data;
  const home = `/studies/${code}`;
  const underWay = latest && (latest.status === 'queued' || latest.status === 'running');
  // A run that somebody cancelled is no news once there is a forecast to show.
  const told = latest && !(done && latest.status === 'cancelled');
  const age = done ? daysApart(done.cutoffOn, today) : 0;
  return (
    <>
      {!done && <PageHead path={[{ label: code, href: home }, { label: 'Forecasts' }]} title="Forecasts" />}
      {told && (
        <div className={done ? 'mb-8' : undefined}>
          {underWay ? (
            <RunWatch key={latest.number} code={code} run={latest} shown={done?.number} />
          ) : (
            <RunStopped code={code} run={latest} />
          )}
        </div>
      )}
      {!latest && !done && (
        <EmptyState
          title="No forecast yet"
          action={
            <>
              <ButtonLink href={`${home}/forecasts/new`}>Run a forecast</ButtonLink>
              <Link href={`${home}/plan`}>See the plan’s own dates</Link>
            </>
          }
        >
          A run needs a saved plan and at least one site. A data cut makes it forecast events as well.
        </EmptyState>
      )}
      {done && age > STALE_AFTER_DAYS && (
        <Notice tone="caution" title={`Data are ${formatQuantity(age, 'day')} old`} className="mb-5">
          The newest forecast is from data to {formatDate(done.cutoffOn)}. What came in since is not in it.
        </Notice>
      )}
      {done?.forecast && done.context && (
        <RunDone code={code} run={done} forecast={done.forecast} context={done.context} readers={readers} />
      )}
      {runs.total > 0 && (
        <Section title="Runs" aside={<Link href={`${home}/forecasts/new`}>Run a forecast</Link>}>
          <RunList code={code} runs={runs.items} />
          <Pagination
            page={runs.page}
            pageSize={runs.size}
            total={runs.total}
            things="runs"
            hrefOf={(page) => `${home}/forecasts?page=${page}`}
          />
        </Section>
      )}
    </>
  );
}
