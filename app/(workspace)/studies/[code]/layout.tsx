import type { Metadata } from 'next';
import type { ReactNode } from 'react';
import { PageFrame } from '@/components/shell/page-frame';
import { StudyFrame } from '@/components/studies/study-frame';
import { NoPermission } from '@/components/shell/no-permission';
import { systemClock } from '@/lib/clock';
import { readStudy } from '@/lib/http/page';
import { getStudyFrame } from '@/lib/studies/queries';

interface Props {
  children: ReactNode;
  params: Promise<{ code: string }>;
}

export async function generateMetadata({ params }: Pick<Props, 'params'>): Promise<Metadata> {
  const { code } = await params;
  return { title: { default: code, template: `%s · ${code} · Kalends` } };
}

/** The study's list of sections beside its pages, for those roles that have several. */
export default async function StudyLayout({ children, params }: Props) {
  const { code } = await params;
  const read = await readStudy(code, 'study:read', (scope, em) =>
    getStudyFrame(scope, null, { em, clock: systemClock }),
  );
  if (!read.permitted) {
    return (
      <PageFrame>
        <NoPermission detail={read.detail} />
      </PageFrame>
    );
  }
  return <StudyFrame frame={read.data}>{children}</StudyFrame>;
}
