'use client';

import { useRouter } from 'next/navigation';
import { useEffect } from 'react';
import { Button } from '@/components/ui/button';
import { EmptyState } from '@/components/ui/empty-state';
import { ProgressBar } from '@/components/ui/progress-bar';
import { formatCount, formatDuration, formatQuantity } from '@/lib/format';
import { isUnderWay, useCancelForecast, useRun } from '@/lib/forecasts/hooks';
import type { RunView } from '@/lib/forecasts/schema';

interface RunWatchProps {
  code: string;
  run: RunView;
  /** The run with a forecast that stays on show meanwhile. */
  shown?: number | null;
}

/** A run under way: how far it is, asked once a second. When it has ended the page shows what came of it. */
export function RunWatch({ code, run: initial, shown }: RunWatchProps) {
  const router = useRouter();
  const { data: run, dataUpdatedAt, isFetchedAfterMount, isError } = useRun(code, initial);
  const cancel = useCancelForecast(code, initial.number);
  const ended = !isUnderWay(run);
  useEffect(() => {
    if (ended) router.refresh();
  }, [ended, router]);
  // An estimate only once the server has answered: before that the two clocks say nothing about each other.
  const seconds = isFetchedAfterMount && run.startedAt ? (dataUpdatedAt - Date.parse(run.startedAt)) / 1000 : 0;
  const left = seconds > 1 && run.drawsDone > 0 ? (seconds * (run.draws - run.drawsDone)) / run.drawsDone : null;
  return (
    <EmptyState
      title={run.status === 'queued' ? `Run ${run.number} is waiting` : `Run ${run.number} is being computed`}
      action={
        <Button
          variant="second"
          pending={cancel.isPending || ended}
          pendingLabel={ended ? 'Done' : 'Cancelling'}
          onClick={() => cancel.mutate()}
        >
          Cancel the run
        </Button>
      }
    >
      <ProgressBar
        label={`Drawing ${formatQuantity(run.draws, 'future')}`}
        share={run.status === 'queued' ? null : run.drawsDone / run.draws}
        detail={
          run.status === 'queued'
            ? 'as soon as a worker is free'
            : `${formatCount(run.drawsDone)} done${left === null ? '' : `, about ${formatDuration(left)} left`}`
        }
      />
      <p className="mt-2 text-13 text-ink-soft">
        {isError
          ? 'The server does not answer at the moment; the run goes on.'
          : `You can leave; it goes on.${shown ? ` Run ${shown} stays on show until it is done.` : ''}`}
      </p>
    </EmptyState>
  );
}
