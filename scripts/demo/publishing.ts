import { act } from '@/scripts/demo/acting';
import { type DemoTrial, subjectListing } from '@/scripts/demo/generate';
import type { DemoCast } from '@/scripts/demo/study-301';
import type { Timeline } from '@/scripts/demo/timeline';
import { addAlertRule } from '@/lib/alerts/commands';
import type { AddAlertRuleBody } from '@/lib/alerts/schema';
import { fixedClock } from '@/lib/clock';
import { acceptCut } from '@/lib/data-cuts/commands';
import { addMonths, monthEnd } from '@/lib/dates';
import { requestForecast } from '@/lib/forecasts/commands';
import { computeForecastRun } from '@/lib/forecasts/jobs';
import { acknowledgeCautions, publishForecast } from '@/lib/publications/commands';
import { ForecastRun } from '@/entities/forecast-run';

interface Release {
  cast: DemoCast;
  code: string;
  /** The month whose end is the cut-off. */
  month: string;
  /** Null: the study has no events, and a run needs no cut. */
  trial: DemoTrial | null;
  note: string;
}

/** A data cut, a run and its publication in the days after a month, as the statistician does them. */
export function planRelease(timeline: Timeline, { cast, code, month, trial, note }: Release): void {
  const { statistician } = cast;
  const cutoffOn = monthEnd(month);
  const next = addMonths(month, 1);
  const state = { cut: null as number | null, run: 0 };
  if (trial) {
    timeline.add(`${next}-06T09:30:00.000Z`, (at) =>
      act(statistician, code, 'data-cuts:accept', at, async (scope, context) => {
        const file = {
          name: `${code}-${cutoffOn}.csv`,
          bytes: new TextEncoder().encode(subjectListing(trial, cutoffOn)),
        };
        const body = { cutoffOn, note: null };
        state.cut = (await acceptCut(scope, { file, body }, context)).number;
      }),
    );
  }
  timeline.add(`${next}-06T10:12:00.000Z`, async (at) => {
    const body = { cutoffOn, dataCutNumber: state.cut, draws: null, seed: null };
    const runId = await act(statistician, code, 'forecasts:run', at, async (scope, context) => {
      const run = await requestForecast(scope, { body }, context);
      state.run = run.number;
      const key = { organisationId: scope.organisationId, studyId: scope.studyId, number: run.number };
      return (await context.em.findOneOrFail(ForecastRun, key)).id;
    });
    await computeForecastRun({ organisationId: cast.organisationId, runId }, fixedClock(at));
  });
  timeline.add(`${next}-06T15:40:00.000Z`, (at) =>
    act(statistician, code, 'publications:publish', at, (scope, context) =>
      publishForecast(scope, { body: { runNumber: state.run, note, confirm: true } }, context),
    ),
  );
}

/** The sponsor reads and acknowledges a publication on the next morning. */
export function planReading(timeline: Timeline, cast: DemoCast, code: string, month: string, number: number): void {
  timeline.add(`${addMonths(month, 1)}-07T07:55:00.000Z`, (at) =>
    act(cast.sponsor, code, 'publications:acknowledge', at, (scope, context) =>
      acknowledgeCautions(scope, { params: { number } }, context),
    ),
  );
}

export function planRule(
  timeline: Timeline,
  cast: DemoCast,
  code: string,
  at: string,
  rule: Omit<AddAlertRuleBody, 'isActive'>,
): void {
  timeline.add(at, (instant) =>
    act(cast.statistician, code, 'alerts:change', instant, (scope, context) =>
      addAlertRule(scope, { body: { ...rule, isActive: true } }, context),
    ),
  );
}
