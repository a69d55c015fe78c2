import type { Metadata } from 'next';
import Link from 'next/link';
import { RunForm } from '@/components/forecasts/run-form';
import { NoPermission } from '@/components/shell/no-permission';
import { ButtonLink } from '@/components/ui/button-link';
import { EmptyState } from '@/components/ui/empty-state';
import { PageHead } from '@/components/ui/page-head';
import { systemClock } from '@/lib/clock';
import { listRunChoices } from '@/lib/forecasts/queries';
import { readStudy } from '@/lib/http/page';

export const metadata: Metadata = { title: 'Run a forecast' };

interface Props {
  params: Promise<{ code: string }>;
  searchParams: Promise<Record<string, string | string[] | undefined>>;
}

export default async function NewForecastPage({ params, searchParams }: Props) {
  const { code } = await params;
  const asked = Number((await searchParams).cut);
  const read = await readStudy(code, 'forecasts:run', (scope, em) => listRunChoices(scope, { em, clock: systemClock }));
  if (!read.permitted) return <NoPermission detail={read.detail} code={code} />;
  const choices = read.data;
  const home = `/studies/${code}`;
  const cut = choices.cuts.find(({ number }) => number === asked) ?? choices.cuts[0];
  return (
    <>
      <PageHead
        path={[{ label: code, href: home }, { label: 'Forecasts', href: `${home}/forecasts` }, { label: 'New run' }]}
        title="Run a forecast"
        lead={
          choices.plan && (
            <p className="max-w-measure">
              From <Link href={`${home}/plan`}>version {choices.plan.number} of the plan</Link>, the sites, the log and
              a data cut. The exact study file is kept with the run, so that anyone can run it again to the same
              numbers.
            </p>
          )
        }
      />
      {choices.plan ? (
        <RunForm code={code} choices={choices} plan={choices.plan} cut={cut?.number ?? null} />
      ) : (
        <EmptyState title="No plan yet" action={<ButtonLink href={`${home}/plan`}>Set up the plan</ButtonLink>}>
          A run is computed from a saved version of the plan. Save one, then run a forecast.
        </EmptyState>
      )}
    </>
  );
}
