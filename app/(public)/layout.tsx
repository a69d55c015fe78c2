import type { ReactNode } from 'react';
import { RunningHead } from '@/components/shell/running-head';

const LINKS = [
  { label: 'Method', href: '/method' },
  { label: 'Status', href: '/status' },
  { label: 'Sign in', href: '/sign-in' },
];

export default function PublicLayout({ children }: { children: ReactNode }) {
  return (
    <>
      <RunningHead links={LINKS} />
      {children}
    </>
  );
}
