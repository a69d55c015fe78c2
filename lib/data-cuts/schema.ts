import { z } from 'zod';
import type { AggregateEvents, SubjectStatus } from '../engine/types';
import { instant, isoDate, paged, studyParams } from '../http/params';
import { LISTING_FORMS, listingFaultSchema, SUBJECT_STATUSES } from '../subject-listings/schema';

export type AggregateCounts = AggregateEvents;

export interface CutCounts {
  subjects: number;
  byStatus: Record<SubjectStatus, number>;
}

/**
 * A site whose listing and log disagree on the number randomised by the cut-off; null: the study as a whole, where only
 * totals are given. `notLogged` of those listed were randomised in months that the site has not logged: those are no
 * disagreement, since a month not logged is not a nought.
 */
export interface SiteDifference {
  site: string | null;
  listed: number;
  logged: number;
  notLogged: number;
}

/** As many rows as a preview shows. */
export const SHOWN_SUBJECTS = 20;

export const cutParams = studyParams.extend({ number: z.coerce.number().int().min(1).max(1_000_000) });

const cutoffOn = isoDate.refine((date) => date >= '1990-01-01', 'Give a day from 1990 on.');
const note = z
  .string()
  .trim()
  .max(2000, 'At most 2,000 characters.')
  .transform((text) => (text === '' ? null : text))
  .nullable()
  .default(null);

export const previewCutBody = z.strictObject({ cutoffOn });
export const acceptCutBody = z.strictObject({ cutoffOn, note });
export type AcceptCutBody = z.infer<typeof acceptCutBody>;

const count = z
  .number('Give a whole number.')
  .int('Whole numbers only.')
  .min(0, 'A count is not below 0.')
  .max(1_000_000, 'At most 1,000,000.');

export const acceptAggregateBody = z.strictObject({
  cutoffOn,
  events: count,
  withdrawn: count,
  atRisk: count,
  personMonths: z
    .number('Give a number, for example 4210.5.')
    .min(0, 'Time at risk is not below 0.')
    .max(100_000_000, 'At most 100,000,000.'),
  note,
});
export type AcceptAggregateBody = z.infer<typeof acceptAggregateBody>;

const counts = z.strictObject({
  subjects: z.number(),
  byStatus: z.strictObject({
    event: z.number(),
    'event-pending': z.number(),
    withdrawn: z.number(),
    completed: z.number(),
    'at-risk': z.number(),
  }),
});

const difference = z.strictObject({
  site: z.string().nullable(),
  listed: z.number(),
  logged: z.number(),
  notLogged: z.number(),
});

const reconciledSite = difference.extend({ site: z.string(), agrees: z.boolean() });
export type ReconciledSite = z.infer<typeof reconciledSite>;

export const cutPreviewSchema = z.strictObject({
  fileName: z.string(),
  form: z.enum(LISTING_FORMS),
  cutoffOn: isoDate,
  rows: z.number(),
  counts,
  faultCount: z.number(),
  /** The first five hundred. */
  faults: z.array(listingFaultSchema),
  subjects: z.array(
    z.strictObject({
      id: z.string(),
      site: z.string(),
      randomisedOn: isoDate,
      status: z.enum(SUBJECT_STATUSES),
      statusOn: isoDate,
    }),
  ),
  /** Sites with anything listed or logged, by code. */
  sites: z.array(reconciledSite),
  noteNeeded: z.boolean(),
});
export type CutPreview = z.infer<typeof cutPreviewSchema>;

const cutHead = {
  number: z.number(),
  cutoffOn: isoDate,
  kind: z.enum(['subjects', 'aggregate']),
  counts,
  acceptedAt: instant,
  acceptedBy: z.string(),
};

export const cutHeadSchema = z.strictObject({ ...cutHead, differences: z.number() });
export type CutHead = z.infer<typeof cutHeadSchema>;

export const cutListSchema = paged(cutHeadSchema);

export const cutSchema = z.strictObject({
  ...cutHead,
  aggregate: z
    .strictObject({ events: z.number(), withdrawn: z.number(), atRisk: z.number(), personMonths: z.number() })
    .nullable(),
  differences: z.array(difference),
  note: z.string().nullable(),
  file: z.strictObject({ name: z.string(), sha256: z.string(), bytes: z.number() }).nullable(),
  /** Numbers of the runs that used it, newest first, at most 50. */
  runs: z.array(z.number()),
});
export type CutView = z.infer<typeof cutSchema>;
