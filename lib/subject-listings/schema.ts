import { z } from 'zod';
import type { Subject } from '../engine/types';

export const MOST_SUBJECTS = 200_000;

/** A file that is wrong in every row is told so in its first five hundred faults and their number. */
export const MOST_FAULTS = 500;

export const SUBJECT_STATUSES = ['event', 'event-pending', 'withdrawn', 'completed', 'at-risk'] as const;

/** Our own columns, as the template has them; or those of CDISC ADaM's time-to-event set. */
export const LISTING_FORMS = ['own', 'adtte'] as const;
export type ListingForm = (typeof LISTING_FORMS)[number];

/** A subject and where it stands in the file; the head is row 1. */
export interface ListedSubject extends Subject {
  row: number;
}

/** Where a listing is wrong, with what stands there and what would be right. */
export const listingFaultSchema = z.strictObject({
  row: z.number(),
  column: z.string().nullable(),
  value: z.string().nullable(),
  detail: z.string(),
});
export type ListingFault = z.infer<typeof listingFaultSchema>;

export interface Listing {
  form: ListingForm;
  rows: number;
  subjects: ListedSubject[];
  /** The first five hundred, in the order of the rows. */
  faults: ListingFault[];
  faultCount: number;
}
