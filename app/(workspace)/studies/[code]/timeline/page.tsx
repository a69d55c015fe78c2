import type { Metadata } from 'next';
import { TimelineView } from '@/components/publications/timeline-view';
import { NoPermission } from '@/components/shell/no-permission';
import { EmptyState } from '@/components/ui/empty-state';
import { PageHead } from '@/components/ui/page-head';
import { systemClock } from '@/lib/clock';
import { readStudy } from '@/lib/http/page';
import { findTimeline, HISTORY_LENGTH, listStatisticians } from '@/lib/publications/queries';
import { timelineSearch } from '@/lib/publications/schema';

export const metadata: Metadata = { title: 'Timeline' };

interface Props {
  params: Promise<{ code: string }>;
  searchParams: Promise<Record<string, string | string[] | undefined>>;
}

export default async function TimelinePage({ params, searchParams }: Props) {
  const { code } = await params;
  const { milestone, page } = timelineSearch.parse(await searchParams);
  const read = await readStudy(code, 'publications:read', async (scope, em) => ({
    role: scope.role,
    timeline: await findTimeline(scope, { milestone, page }, { em, clock: systemClock }),
    statisticians: await listStatisticians(scope, em),
  }));
  if (!read.permitted) return <NoPermission detail={read.detail} code={code} />;
  const { role, timeline, statisticians } = read.data;
  if (!timeline) {
    return (
      <>
        <PageHead path={[{ label: code, href: `/studies/${code}` }, { label: 'Timeline' }]} title="Timeline" />
        <EmptyState title="Nothing is published yet">
          <p>
            When {statisticians.join(' or ') || 'the study’s statistician'} publishes the first forecast you will find
            it here.
          </p>
        </EmptyState>
      </>
    );
  }
  return (
    <TimelineView
      code={code}
      timeline={timeline}
      page={page}
      pageSize={HISTORY_LENGTH}
      mayAcknowledge={role === 'sponsor'}
    />
  );
}
