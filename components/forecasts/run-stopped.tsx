import Link from 'next/link';
import { ButtonLink } from '@/components/ui/button-link';
import { EmptyState } from '@/components/ui/empty-state';
import { formatInstant } from '@/lib/format';
import type { Run } from '@/lib/forecasts/schema';

/** A run without a forecast: why, and what to do. */
export function RunStopped({ code, run }: { code: string; run: Run }) {
  const failed = run.status === 'failed';
  return (
    <EmptyState
      tone={failed ? 'stop' : 'plain'}
      title={failed ? `Run ${run.number} stopped` : `Run ${run.number} was cancelled`}
      action={
        <>
          <ButtonLink variant="second" href={`/studies/${code}/forecasts/new`}>
            Run a forecast
          </ButtonLink>
          {run.dataCut !== null && <Link href={`/studies/${code}/data-cuts/${run.dataCut}`}>Open the data cut</Link>}
        </>
      }
      reference={`Run ${run.number}, study file ${run.studySha256.slice(0, 12)}${run.finishedAt ? `, ${formatInstant(run.finishedAt)}` : ''}`}
    >
      <p>{run.failure?.reason ?? 'Nothing of it was kept. The runs before stand as they were.'}</p>
      {run.failure && run.failure.errors.length > 0 && (
        <ul className="list-disc pl-5">
          {run.failure.errors.map(({ pointer, detail }) => (
            <li key={pointer + detail}>
              <span className="font-600">{pointer}</span>: {detail}
            </li>
          ))}
        </ul>
      )}
    </EmptyState>
  );
}
