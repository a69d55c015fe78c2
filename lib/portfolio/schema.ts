import { z } from 'zod';
import { STUDY_ROLES } from '../auth/permissions';
import type { MilestoneForecast } from '../engine/types';
import { RUN_STATUSES } from '../forecasts/schema';
import { isoDate } from '../http/params';

/** As many studies as are drawn under one axis. */
export const STUDIES_PER_PAGE = 40;

export const PORTFOLIO_ORDERS = ['late', 'date', 'code'] as const;
export type PortfolioOrder = (typeof PORTFOLIO_ORDERS)[number];

/** Late: under 20 % chance of the next planned date; in doubt: to 60 %; on plan: above. */
export const STANDINGS = ['late', 'in-doubt', 'on-plan', 'undated', 'no-forecast', 'no-view'] as const;
export type Standing = (typeof STANDINGS)[number];

export const portfolioQuery = z.strictObject({
  search: z
    .string()
    .trim()
    .max(100)
    .transform((word) => word || undefined)
    .optional(),
  order: z.enum(PORTFOLIO_ORDERS, 'Order by late, date or code.').default('late'),
  page: z.coerce.number().int('Give a whole number.').min(1).max(100_000).default(1),
});
export type PortfolioQuery = z.infer<typeof portfolioQuery>;

/** A milestone's forecast without its weekly density: a bracket needs none. */
const bracketForecast = z.custom<MilestoneForecast>((value) => typeof value === 'object' && value !== null);

export const portfolioMilestone = z.strictObject({
  code: z.string(),
  name: z.string(),
  kind: z.enum(['randomised', 'events', 'follow-up', 'all-of']),
  plannedOn: isoDate.nullable(),
  forecast: bracketForecast.nullable(),
});
export type PortfolioMilestone = z.infer<typeof portfolioMilestone>;

const countOf = z.strictObject({ reached: z.number(), of: z.number().nullable() });

export const portfolioStudy = z.strictObject({
  code: z.string(),
  title: z.string(),
  sponsorName: z.string(),
  organisationName: z.string(),
  isDemonstration: z.boolean(),
  role: z.enum([...STUDY_ROLES, 'owner']),
  standing: z.enum(STANDINGS),
  /** The next milestone with a planned day, and the chance of meeting it. */
  next: z.strictObject({ name: z.string(), plannedOn: isoDate, probability: z.number() }).nullable(),
  milestones: z.array(portfolioMilestone),
  counts: z.strictObject({ randomised: countOf, events: countOf.nullable() }).nullable(),
  published: z.strictObject({ number: z.number(), on: isoDate, dataCutoff: isoDate, cautions: z.number() }).nullable(),
  /** The statistician's own: the latest run, where it is not the published one. */
  run: z.strictObject({ number: z.number(), status: z.enum(RUN_STATUSES), reason: z.string().nullable() }).nullable(),
  planSavedOn: isoDate.nullable(),
  /** The coordinator's own site. */
  site: z.strictObject({ code: z.string(), name: z.string(), city: z.string(), monthsDue: z.number() }).nullable(),
});
export type PortfolioStudy = z.infer<typeof portfolioStudy>;

export const portfolioSchema = z.strictObject({
  items: z.array(portfolioStudy),
  page: z.number(),
  size: z.number(),
  /** Studies that match the search, and all of the person's. */
  total: z.number(),
  all: z.number(),
  today: isoDate,
  /** The soonest date of all that are forecast. */
  soonest: z.strictObject({ code: z.string(), milestone: portfolioMilestone }).nullable(),
  stopped: z.number(),
  stale: z.number(),
});
export type Portfolio = z.infer<typeof portfolioSchema>;
