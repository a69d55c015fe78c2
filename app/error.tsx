'use client';

import { PageFrame } from '@/components/shell/page-frame';
import { RunningHead } from '@/components/shell/running-head';
import { Button } from '@/components/ui/button';
import { EmptyState } from '@/components/ui/empty-state';

interface ErrorPageProps {
  error: Error & { digest?: string };
  reset: () => void;
}

/** Says that it stopped and what to quote, never what the machine said. */
export default function ErrorPage({ error, reset }: ErrorPageProps) {
  return (
    <>
      <RunningHead />
      <PageFrame forecast={false}>
        <EmptyState
          tone="stop"
          title="This page stopped"
          action={<Button onClick={reset}>Try again</Button>}
          reference={error.digest ? `Reference ${error.digest}` : undefined}
        >
          <p>Nothing you had saved is lost. If it stops again, send the reference to whoever runs this installation.</p>
        </EmptyState>
      </PageFrame>
    </>
  );
}
