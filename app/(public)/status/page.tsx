import type { Metadata } from 'next';
import { StatusBoard } from '@/components/landing/status-board';
import { PageFrame } from '@/components/shell/page-frame';
import { PageHead } from '@/components/ui/page-head';

export const metadata: Metadata = { title: 'Status' };

export default function StatusPage() {
  return (
    <PageFrame forecast={false}>
      <PageHead title="Is it running?" lead="Asked from this page, every half minute." />
      <StatusBoard />
    </PageFrame>
  );
}
