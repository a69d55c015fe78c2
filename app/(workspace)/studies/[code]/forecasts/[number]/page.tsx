import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { RunDone } from '@/components/forecasts/run-done';
import { RunStopped } from '@/components/forecasts/run-stopped';
import { RunWatch } from '@/components/forecasts/run-watch';
import { NoPermission } from '@/components/shell/no-permission';
import { PageHead } from '@/components/ui/page-head';
import { formatLongDate } from '@/lib/format';
import { getRun } from '@/lib/forecasts/queries';
import { readStudy } from '@/lib/http/page';
import { runParams } from '@/lib/forecasts/schema';
import { countReaders } from '@/lib/publications/queries';
import { runSentence } from '@/components/forecasts/run-words';

interface Props {
  params: Promise<{ code: string; number: string }>;
}

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  return { title: `Run ${(await params).number}` };
}

export default async function RunPage({ params }: Props) {
  const asked = runParams.safeParse(await params);
  if (!asked.success) notFound();
  const { code, number } = asked.data;
  const read = await readStudy(code, 'forecasts:read', async (scope, em) => ({
    run: await getRun(scope, { params: { number } }, { em }),
    readers: await countReaders(scope, em),
  }));
  if (!read.permitted) return <NoPermission detail={read.detail} code={code} />;
  const { run, readers } = read.data;
  if (run.forecast && run.context)
    return <RunDone code={code} run={run} forecast={run.forecast} context={run.context} readers={readers} />;
  return (
    <>
      <PageHead
        path={[
          { label: code, href: `/studies/${code}` },
          { label: 'Forecasts', href: `/studies/${code}/forecasts` },
          { label: `Run ${number}` },
        ]}
        title={`Forecast from data to ${formatLongDate(run.cutoffOn)}`}
        lead={<p>{runSentence(run)}</p>}
      />
      {run.status === 'queued' || run.status === 'running' ? (
        <RunWatch key={number} code={code} run={run} />
      ) : (
        <RunStopped code={code} run={run} />
      )}
    </>
  );
}
