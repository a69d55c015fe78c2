import { z } from 'zod';
import { isCountryCode } from '../countries';
import { isoDate, paged, studyParams } from '../http/params';

export const SITE_STATUSES = ['open', 'to-open', 'overdue', 'closed'] as const;
export type SiteStatus = (typeof SITE_STATUSES)[number];

export const SITE_STATUS_NAMES: Record<SiteStatus, string> = {
  open: 'open',
  'to-open': 'to open',
  overdue: 'overdue',
  closed: 'closed',
};

/** Goes into addresses and into the study file as it is. */
export const SITE_CODE = /^[A-Za-z0-9][A-Za-z0-9._-]{0,39}$/;
const ONE_LINE = /^[^\p{Cc}]*$/u;

export const siteParams = studyParams.extend({ site: z.string().max(40) });

/** The study file's own range. */
const siteDate = isoDate
  .refine((date) => date >= '1990-01-01' && date <= '2100-12-31', 'Give a day between 1990 and 2100.')
  .nullable();

const text = (what: string) =>
  z
    .string()
    .trim()
    .min(1, `Give ${what}.`)
    .max(200, 'At most 200 characters.')
    .regex(ONE_LINE, 'Write it on one line.');

export const siteShape = {
  code: z
    .string()
    .trim()
    .min(1, 'Give the site’s code.')
    .regex(SITE_CODE, 'A code has up to 40 letters, digits, full stops, hyphens or underscores, for example 107.'),
  name: text('the site’s name'),
  city: text('the city'),
  country: z
    .string()
    .trim()
    .toUpperCase()
    .refine(isCountryCode, 'Choose a country. In files: its two letters, for example PL.'),
  plannedEarliest: siteDate,
  plannedLikely: siteDate,
  plannedLatest: siteDate,
  activatedOn: siteDate,
  closedOn: siteDate,
  cap: z
    .number('Give a whole number.')
    .int('Whole numbers only.')
    .min(1, 'A cap is at least 1. Leave it empty where there is none.')
    .max(1_000_000, 'A cap is at most 1,000,000.')
    .nullable(),
};

export const addSiteBody = z.strictObject(siteShape);
export type SiteInput = z.infer<typeof addSiteBody>;
export type SiteField = keyof SiteInput;

/** The version of the site that the form showed travels with it. */
export const changeSiteBody = addSiteBody.extend({ version: z.number().int().min(1) });
export type ChangeSiteBody = z.infer<typeof changeSiteBody>;

export const siteSchema = z.strictObject({
  id: z.uuid(),
  code: z.string(),
  name: z.string(),
  city: z.string(),
  country: z.string(),
  plannedEarliest: isoDate.nullable(),
  plannedLikely: isoDate.nullable(),
  plannedLatest: isoDate.nullable(),
  activatedOn: isoDate.nullable(),
  closedOn: isoDate.nullable(),
  cap: z.number().nullable(),
  version: z.number(),
});
export type SiteView = z.infer<typeof siteSchema>;

export const listedSiteSchema = siteSchema.extend({
  status: z.enum(SITE_STATUSES),
  randomised: z.number(),
  /** Months over since the activation without any figure, and those with some figures missing. */
  monthsMissing: z.number(),
  monthsIncomplete: z.number(),
});
export type ListedSite = z.infer<typeof listedSiteSchema>;

const optionalWord = z
  .string()
  .trim()
  .max(100)
  .transform((word) => word || undefined)
  .optional();

export const sitesQuery = z.strictObject({
  page: z.coerce.number().int('Give a whole number.').min(1).max(100_000).default(1),
  size: z.coerce.number().int('Give a whole number.').min(1).max(200).default(50),
  search: optionalWord,
  country: z
    .union([
      z.literal('').transform(() => undefined),
      z.string().refine(isCountryCode, 'Choose a country from the list.'),
    ])
    .optional(),
  status: z
    .union([z.literal('').transform(() => undefined), z.enum(SITE_STATUSES, 'Choose a status from the list.')])
    .optional(),
});
export type SitesQuery = z.infer<typeof sitesQuery>;

export const sitesSchema = paged(listedSiteSchema);
export type SitesPage = z.infer<typeof sitesSchema>;

/** Head of the page and what its filters offer. */
export interface SitesSummary {
  today: string;
  total: number;
  byStatus: Record<SiteStatus, number>;
  countries: string[];
  randomised: number;
}

export interface SiteWindow {
  code: string;
  name: string;
  city: string;
  earliest: string;
  likely: string;
  latest: string;
  overdue: boolean;
}

/** Sites still to open, overdue ones first, as many as are drawn, and how many there are. */
export interface SiteWindows {
  today: string;
  items: SiteWindow[];
  total: number;
}
