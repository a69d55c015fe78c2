import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { TimelineView } from '@/components/publications/timeline-view';
import { NoPermission } from '@/components/shell/no-permission';
import { systemClock } from '@/lib/clock';
import { readStudy } from '@/lib/http/page';
import { getPublicationOperation } from '@/lib/publications/operations';
import { findTimeline, HISTORY_LENGTH } from '@/lib/publications/queries';
import { timelineSearch } from '@/lib/publications/schema';

interface Props {
  params: Promise<{ code: string; number: string }>;
  searchParams: Promise<Record<string, string | string[] | undefined>>;
}

export async function generateMetadata({ params }: Pick<Props, 'params'>): Promise<Metadata> {
  return { title: `Publication ${(await params).number}` };
}

/** An older publication, as it was. */
export default async function PublicationPage({ params, searchParams }: Props) {
  const asked = getPublicationOperation.params.safeParse(await params);
  if (!asked.success) notFound();
  const { code, number } = asked.data;
  const { milestone, page } = timelineSearch.parse(await searchParams);
  const read = await readStudy(code, 'publications:read', async (scope, em) => ({
    role: scope.role,
    timeline: await findTimeline(scope, { number, milestone, page }, { em, clock: systemClock }),
  }));
  if (!read.permitted) return <NoPermission detail={read.detail} code={code} />;
  const { role, timeline } = read.data;
  if (!timeline) notFound();
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
