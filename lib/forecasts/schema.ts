import { z } from 'zod';
import type { Forecast } from '../engine/types';
import type { FieldFault } from '../errors';
import { instant, isoDate, paged, studyParams } from '../http/params';

export const RUN_STATUSES = ['queued', 'running', 'done', 'failed', 'cancelled'] as const;
export type RunStatus = (typeof RUN_STATUSES)[number];

export const RUN_STATUS_NAMES: Record<RunStatus, string> = {
  queued: 'waiting',
  running: 'being computed',
  done: 'done',
  failed: 'stopped',
  cancelled: 'cancelled',
};

/** A failed run is an outcome of the run: its reason, with the faults of the study file where there are some. */
export interface RunFailure {
  reason: string;
  errors: FieldFault[];
}

/** Runs of one organisation that may wait or be computed at a time. */
export const MOST_RUNS_AT_ONCE = 2;

/** How often a run that is under way is asked after, and how often its worker says that it lives. */
export const POLL_MILLISECONDS = 1000;

export const runParams = studyParams.extend({ number: z.coerce.number().int().min(1).max(1_000_000) });

/** What is left out comes from the data cut, the calendar (the last month that is over) and the plan. */
export const requestForecastBody = z.strictObject({
  cutoffOn: isoDate
    .refine((date) => date >= '1990-01-01', 'Give a day from 1990 on.')
    .nullable()
    .default(null),
  dataCutNumber: z
    .number('Choose a data cut.')
    .int('Choose a data cut.')
    .min(1, 'Choose a data cut.')
    .nullable()
    .default(null),
  draws: z
    .number('Give a whole number, for example 10000.')
    .int('Whole numbers only.')
    .min(100, 'At least 100.')
    .max(1_000_000, 'At most 1,000,000.')
    .nullable()
    .default(null),
  seed: z
    .number('Give a whole number, for example 1.')
    .int('Whole numbers only.')
    .min(0, 'At least 0.')
    .max(4_294_967_295, 'At most 4,294,967,295.')
    .nullable()
    .default(null),
});
export type RequestForecastBody = z.infer<typeof requestForecastBody>;

/** How events entered: by the subjects of a listing, by totals, by the plan alone, or not at all. */
export const EVENT_SOURCES = ['subjects', 'aggregate', 'plan', 'none'] as const;
export type EventSource = (typeof EVENT_SOURCES)[number];

const quantile = isoDate.nullable();
const firstMilestone = z.strictObject({
  code: z.string(),
  name: z.string(),
  reachedOn: quantile,
  probabilityReached: z.number(),
  low: quantile,
  median: quantile,
  high: quantile,
});
export type FirstMilestone = z.infer<typeof firstMilestone>;

export const runSchema = z.strictObject({
  number: z.number(),
  status: z.enum(RUN_STATUSES),
  cutoffOn: isoDate,
  planVersion: z.number(),
  dataCut: z.number().nullable(),
  draws: z.number(),
  drawsDone: z.number(),
  seed: z.number(),
  studySha256: z.string(),
  engineVersion: z.string().nullable(),
  failure: z
    .strictObject({
      reason: z.string(),
      errors: z.array(z.strictObject({ pointer: z.string(), detail: z.string() })),
    })
    .nullable(),
  requestedAt: instant,
  requestedBy: z.string(),
  startedAt: instant.nullable(),
  finishedAt: instant.nullable(),
  /** The number under which it is published. */
  publication: z.number().nullable(),
  /** The plan's first milestone, for lists. */
  first: firstMilestone.nullable(),
});
export type Run = z.infer<typeof runSchema>;

export const runListSchema = paged(runSchema);

const observedCounts = z.strictObject({
  randomised: z.number(),
  events: z.number().nullable(),
  withdrawn: z.number().nullable(),
  atRisk: z.number().nullable(),
});

/** The forecast was checked when it was stored; it leaves as it stands in the file. */
const storedForecast = z.custom<Forecast>((value) => typeof value === 'object' && value !== null);

/** What stands around a finished forecast, from the run's own study file and from what came before it. */
const runContext = z.strictObject({
  observed: z.array(z.strictObject({ on: isoDate, randomised: z.number(), events: z.number().nullable() })),
  eventSource: z.enum(EVENT_SOURCES),
  sites: z.strictObject({ open: z.number(), reported: z.number() }),
  plan: z.strictObject({
    meanPerMonth: z.number(),
    cv: z.number(),
    basis: z.enum(['plan', 'data']),
    events: z
      .strictObject({
        family: z.string(),
        medianMonths: z.number(),
        shape: z.number().nullable(),
        priorEvents: z.number(),
        basis: z.enum(['plan', 'data']),
        dropoutPerMonth: z.number(),
      })
      .nullable(),
  }),
  /** The run before that has a forecast. */
  before: z.strictObject({ number: z.number(), cutoffOn: isoDate, observed: observedCounts }).nullable(),
  /** The publication that its dates are held against, with the days that each median moved; null where there is no median. */
  moved: z
    .strictObject({
      publication: z.number(),
      publishedOn: isoDate,
      days: z.record(z.string(), z.number().nullable()),
    })
    .nullable(),
});
export type RunContext = z.infer<typeof runContext>;

export const runViewSchema = runSchema.extend({ forecast: storedForecast.nullable(), context: runContext.nullable() });
export type RunView = z.infer<typeof runViewSchema>;

/** What the form to start a run offers. */
export interface RunChoices {
  plan: { number: number; draws: number; seed: number; hasEvents: boolean } | null;
  /** Newest first, at most 50. */
  cuts: { number: number; cutoffOn: string; kind: 'subjects' | 'aggregate'; subjects: number }[];
  /** The last day of the last month that is over. */
  lastMonthEnd: string;
  today: string;
  /** Patients that the log has by then: with some of them, a run without a cut forecasts enrolment only. */
  logged: number;
  /** Sites that are open. */
  open: number;
}
