import { z } from 'zod';
import { instant, isoDate, isoMonth, paged, studyParams } from '../http/params';

/** The ledger's columns, in the order in which they are typed. */
export const LOG_FIELDS = ['screened', 'failed', 'randomised', 'events', 'withdrawn'] as const;
export type LogField = (typeof LOG_FIELDS)[number];

export const LOG_FIELD_NAMES: Record<LogField, string> = {
  screened: 'Screened',
  failed: 'Failed',
  randomised: 'Randomised',
  events: 'Events',
  withdrawn: 'Withdrawn',
};

export const CORRECTION_REASONS = [
  'typing-error',
  'wrong-month',
  'source-corrected',
  'late-information',
  'other',
] as const;
export type CorrectionReason = (typeof CORRECTION_REASONS)[number];

export const CORRECTION_REASON_NAMES: Record<CorrectionReason, string> = {
  'typing-error': 'Typing error',
  'wrong-month': 'Counted in the wrong month',
  'source-corrected': 'The source record was corrected',
  'late-information': 'Information came late',
  other: 'Other',
};

/** The most that one site can report for one month. */
export const MOST_IN_A_MONTH = 10_000;

export const monthCount = z
  .number('Give a whole number.')
  .int('Whole numbers only.')
  .min(0, 'A count is not below 0.')
  .max(MOST_IN_A_MONTH, 'A month has at most 10,000. Check the figure.');

/** A figure that was not reported is null; it is not nought. */
export type MonthCounts = Record<LogField, number | null>;

const LOG_SOURCES = ['screen', 'paste'] as const;
export type LogSource = (typeof LOG_SOURCES)[number];

const someCell = (cells: object): boolean => Object.values(cells).some((cell) => cell !== undefined);

export const siteLogParams = studyParams.extend({ site: z.string().max(40) });
export const siteMonthParams = siteLogParams.extend({ month: isoMonth });

/** The first figures of a month, as far as they are known. `version` is that of the month the sheet showed; null: none yet. */
export const logMonthBody = z.strictObject({
  version: z.number().int().min(1).nullable(),
  source: z.enum(LOG_SOURCES).default('screen'),
  cells: z
    .strictObject({
      screened: monthCount.optional(),
      failed: monthCount.optional(),
      randomised: monthCount.optional(),
      events: monthCount.optional(),
      withdrawn: monthCount.optional(),
    })
    .refine(someCell, 'Fill in at least one figure.'),
});
export type LogMonthBody = z.infer<typeof logMonthBody>;

/** What the sheet showed, and what it should have said; null: it should have stayed empty. */
const correctedCell = z.strictObject({ from: monthCount.nullable(), to: monthCount.nullable() }).optional();

export const correctMonthBody = z.strictObject({
  source: z.enum(LOG_SOURCES).default('screen'),
  cells: z
    .strictObject({
      screened: correctedCell,
      failed: correctedCell,
      randomised: correctedCell,
      events: correctedCell,
      withdrawn: correctedCell,
    })
    .refine(someCell, 'Change at least one figure.'),
  reasonKind: z.enum(CORRECTION_REASONS, 'Choose a reason.'),
  reason: z.string().trim().min(1, 'Say in a few words why the figure changes.').max(1000, 'At most 1,000 characters.'),
});
export type CorrectMonthBody = z.infer<typeof correctMonthBody>;

const count = z.number().nullable();
const countsShape = { screened: count, failed: count, randomised: count, events: count, withdrawn: count };

export const revisionSchema = z.strictObject({
  field: z.enum(LOG_FIELDS),
  oldValue: count,
  newValue: count,
  reasonKind: z.enum(CORRECTION_REASONS).nullable(),
  reason: z.string().nullable(),
  changedAt: instant,
  changedBy: z.string(),
});
export type RevisionView = z.infer<typeof revisionSchema>;

/** A month is reported when all five figures are there, incomplete when some are. */
export const MONTH_STATES = ['reported', 'incomplete', 'missing'] as const;
export type MonthState = (typeof MONTH_STATES)[number];

export const monthEntrySchema = z.strictObject({
  month: isoMonth,
  state: z.enum(MONTH_STATES),
  ...countsShape,
  /** Null: nothing is logged for this month. */
  version: z.number().nullable(),
  loggedAt: instant.nullable(),
  loggedBy: z.string().nullable(),
  /** Corrections only, newest first. */
  revisions: z.array(revisionSchema),
});
export type MonthEntry = z.infer<typeof monthEntrySchema>;

export const monthSheetSchema = z.strictObject({
  site: z.strictObject({
    code: z.string(),
    name: z.string(),
    city: z.string(),
    country: z.string(),
    activatedOn: isoDate.nullable(),
    closedOn: isoDate.nullable(),
    cap: z.number().nullable(),
  }),
  /** The day that rules about "over" go by. */
  today: isoDate,
  months: z.array(monthEntrySchema),
  /** The month that runs now, where the site is open in it: it can be logged once it is over. */
  runningMonth: isoMonth.nullable(),
  /** Randomised so far by month-end, as the plan has it for a site of this country; empty without a plan. */
  planned: z.array(z.strictObject({ monthEnd: isoDate, randomised: z.number() })),
  mayLog: z.boolean(),
});
export type MonthSheet = z.infer<typeof monthSheetSchema>;

export const overviewQuery = z.strictObject({
  page: z.coerce.number().int('Give a whole number.').min(1).max(100_000).default(1),
  size: z.coerce.number().int('Give a whole number.').min(1).max(200).default(50),
  months: z.coerce.number().int('Give a whole number.').min(1).max(24).default(6),
});
export type OverviewQuery = z.infer<typeof overviewQuery>;

/** `closed`: the site was not open in that month. */
const overviewState = z.enum([...MONTH_STATES, 'closed']);
export type OverviewState = z.infer<typeof overviewState>;

export const overviewSchema = paged(
  z.strictObject({
    code: z.string(),
    name: z.string(),
    city: z.string(),
    country: z.string(),
    activatedOn: isoDate,
    closedOn: isoDate.nullable(),
    randomised: z.number(),
    states: z.array(overviewState),
    missing: z.number(),
    incomplete: z.number(),
  }),
).extend({ months: z.array(isoMonth) });
export type LogOverview = z.infer<typeof overviewSchema>;
export type OverviewRow = LogOverview['items'][number];
