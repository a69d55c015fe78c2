'use client';

import { usePathname } from 'next/navigation';
import type { ReactNode } from 'react';
import { PageFrame } from '@/components/shell/page-frame';
import { StudyRail } from '@/components/shell/study-rail';
import type { StudyFrame as Frame } from '@/lib/studies/schema';

/** The plan's form brings its own list of steps, and needs the width. */
const LEAF = /^\/studies\/[^/]+\/plan$/;

interface StudyFrameProps {
  frame: Frame;
  children: ReactNode;
}

export function StudyFrame({ frame, children }: StudyFrameProps) {
  const pathname = usePathname();
  const home = `/studies/${encodeURIComponent(frame.code)}`;
  const items = frame.rail.map(({ section, label, value, caution }) => {
    const href = `${home}/${section}`;
    return {
      label,
      href,
      value: value ?? undefined,
      caution,
      current: pathname === href || pathname.startsWith(`${href}/`),
    };
  });
  const leaf = items.length < 2 || LEAF.test(pathname);
  return (
    <PageFrame
      rail={leaf ? undefined : <StudyRail code={frame.code} title={frame.title} items={items} />}
      forecast={frame.role !== 'coordinator' && frame.role !== 'owner'}
      demonstration={frame.isDemonstration}
    >
      {children}
    </PageFrame>
  );
}
