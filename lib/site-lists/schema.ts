import { z } from 'zod';
import { siteShape } from '../sites/schema';

/** The columns of a site list, in the order of the template; the first four are needed. */
export const LIST_COLUMNS = [
  'code',
  'name',
  'city',
  'country',
  'earliest',
  'likely',
  'latest',
  'activated',
  'closed',
  'cap',
] as const;
export type ListColumn = (typeof LIST_COLUMNS)[number];

export const NEEDED_COLUMNS = ['code', 'name', 'city', 'country'] as const satisfies readonly ListColumn[];

export const MOST_LISTED_SITES = 5000;

/** As many rows as the preview shows. */
export const SHOWN_ROWS = 100;

export const sitePreviewSchema = z.strictObject({
  fileName: z.string(),
  total: z.number(),
  open: z.number(),
  toOpen: z.number(),
  countries: z.array(z.string()),
  rows: z.array(z.strictObject(siteShape)),
});
export type SitePreview = z.infer<typeof sitePreviewSchema>;

export const acceptedSitesSchema = z.strictObject({ added: z.number() });
