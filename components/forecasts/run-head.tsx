import Link from 'next/link';
import { marksOf, headMilestone, runSentence } from '@/components/forecasts/run-words';
import { ButtonLink } from '@/components/ui/button-link';
import { CautionMarks } from '@/components/ui/footnotes';
import { Mark } from '@/components/ui/mark';
import { type HeadFigure, PageHead } from '@/components/ui/page-head';
import type { Forecast } from '@/lib/engine/types';
import { formatDate, formatLongDate, formatPercent } from '@/lib/format';
import type { Run } from '@/lib/forecasts/schema';
import { milestoneWords, nameOfMilestone, waitsFor } from '@/lib/publications/rules';

interface RunHeadProps {
  code: string;
  run: Run;
  forecast: Forecast;
}

/** What it is, the one date that matters, the one act: to publish it. */
export function RunHead({ code, run, forecast }: RunHeadProps) {
  const home = `/studies/${code}`;
  const published = run.publication !== null;
  const file = (name: string): string => `/api/v1/studies/${encodeURIComponent(code)}/forecasts/${run.number}/${name}`;
  return (
    <PageHead
      path={[
        { label: code, href: home },
        { label: 'Forecasts', href: `${home}/forecasts` },
        { label: formatDate(run.requestedAt.slice(0, 10)) },
      ]}
      title={`Forecast from data to ${formatLongDate(run.cutoffOn)}`}
      lead={
        <p>
          {runSentence(run)}{' '}
          {published ? (
            <Link href={`${home}/timeline`}>Published as number {run.publication}</Link>
          ) : (
            'Not published yet'
          )}
          .
        </p>
      }
      figure={figureOf(forecast)}
      action={
        <>
          {published ? (
            <ButtonLink href={`${home}/forecasts/new`}>Run a forecast</ButtonLink>
          ) : (
            <>
              <ButtonLink href="#publish">Publish to sponsor</ButtonLink>
              <p className="text-13 text-ink-soft">
                Leads to the note and the list of readers. You are asked once more.
              </p>
            </>
          )}
          <ul className="space-y-1 text-13">
            {!published && (
              <li>
                <Link href={`${home}/forecasts/new`}>Run another forecast</Link>
              </li>
            )}
            <li>
              Download: <a href={file('forecast-file')}>forecast file</a>, <a href={file('study-file')}>study file</a>
            </li>
          </ul>
        </>
      }
    />
  );
}

function figureOf(forecast: Forecast): HeadFigure {
  const milestone = headMilestone(forecast.milestones);
  const words = milestoneWords(milestone);
  return {
    label: (
      <>
        <b>{nameOfMilestone(milestone)}</b>, {waitsFor(milestone, forecast.milestones)}
      </>
    ),
    value: words.range,
    unit: words.isRange ? formatPercent(0.8) : undefined,
    below: (
      <>
        {words.exact !== '' && (
          <p>
            <b>{words.exact}</b>
            <CautionMarks marks={marksOf(forecast)[milestone.code]} />
          </p>
        )}
        {words.planned && (
          <p className="text-ink-soft">
            <Mark kind="planned" /> Planned {words.planned}
            {words.chance && `; ${words.chance}`}.
          </p>
        )}
      </>
    ),
  };
}
