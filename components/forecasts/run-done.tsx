import Link from 'next/link';
import { ForecastFigure } from '@/components/charts/forecast-figure';
import { NumbersTable } from '@/components/charts/numbers-table';
import { RunCautions } from '@/components/forecasts/run-cautions';
import { RunFit } from '@/components/forecasts/run-fit';
import { RunHead } from '@/components/forecasts/run-head';
import { RunInputs } from '@/components/forecasts/run-inputs';
import { RunMilestones } from '@/components/forecasts/run-milestones';
import { marksOf } from '@/components/forecasts/run-words';
import { PublishForm } from '@/components/publications/publish-form';
import { Section } from '@/components/ui/section';
import type { Forecast } from '@/lib/engine/types';
import type { Run, RunContext } from '@/lib/forecasts/schema';
import type { ReaderCount } from '@/lib/publications/schema';

export interface RunDoneProps {
  code: string;
  run: Run;
  forecast: Forecast;
  context: RunContext;
  readers: readonly ReaderCount[];
}

/** A finished run: the figure with its numbers, dates, cautions, what went in, fit, and the way to the sponsor. */
export function RunDone({ code, run, forecast, context, readers }: RunDoneProps) {
  return (
    <>
      <RunHead code={code} run={run} forecast={forecast} />
      <ForecastFigure
        cutoff={run.cutoffOn}
        observed={context.observed}
        monthly={forecast.monthly}
        milestones={forecast.milestones}
        cautionMarks={marksOf(forecast)}
      />
      <NumbersTable monthly={forecast.monthly} />
      <RunMilestones forecast={forecast} moved={context.moved} />
      <RunCautions cautions={forecast.cautions} />
      <RunInputs code={code} run={run} observed={forecast.observed} context={context} />
      <RunFit forecast={forecast} plan={context.plan} />
      {run.publication === null ? (
        <Section
          id="publish"
          title="Publish to sponsor"
          aside="It replaces the publication before, which stays in the history"
        >
          <PublishForm
            code={code}
            run={{ number: run.number, dataCutoff: run.cutoffOn }}
            cautions={forecast.cautions}
            milestones={forecast.milestones}
            readers={readers}
          />
        </Section>
      ) : (
        <Section id="publish" title={`Published as number ${run.publication}`}>
          <p>
            It stays as it was published. <Link href={`/studies/${code}/timeline`}>See it as the sponsor does</Link>
          </p>
        </Section>
      )}
    </>
  );
}
