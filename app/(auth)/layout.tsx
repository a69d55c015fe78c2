import type { ReactNode } from 'react';
import { PageFrame } from '@/components/shell/page-frame';
import { RunningHead } from '@/components/shell/running-head';

export default function AuthLayout({ children }: { children: ReactNode }) {
  return (
    <>
      <RunningHead links={[{ label: 'Method', href: '/method' }]} />
      <PageFrame forecast={false}>
        <div className="max-w-measure">{children}</div>
      </PageFrame>
    </>
  );
}
