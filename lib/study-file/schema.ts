import { z } from 'zod';
import { QUANTILE_LEVELS, type Forecast, type Study } from '../engine/types';
import { LIMITS } from './limits';

/** The public contract, `kalends-study/1` and `kalends-forecast/1`: these schemas are its source of truth. */

const DATE_WORDS = 'Give a calendar date as YYYY-MM-DD, for example 2027-03-14.';
const isoDate = z
  .string(DATE_WORDS)
  .refine((text) => isCalendarDate(text), { message: DATE_WORDS, abort: true })
  .refine((text) => text >= LIMITS.firstDate && text <= LIMITS.lastDate, 'Give a date from 1990 to 2100.');

/** Whether a text is a day that the calendar has: 2027-02-30 is none. */
export function isCalendarDate(text: string): boolean {
  if (!/^\d{4}-\d{2}-\d{2}$/.test(text)) return false;
  const time = Date.parse(`${text}T00:00:00Z`);
  return !Number.isNaN(time) && new Date(time).toISOString().startsWith(text);
}

const isoMonth = z
  .string('Give a month as YYYY-MM, for example 2027-03.')
  .regex(/^(199\d|20\d\d|2100)-(0[1-9]|1[0-2])$/, 'Give a month as YYYY-MM, for example 2027-03.');

const code = z.string().min(1).max(40);
const positiveRate = z.number().positive().max(LIMITS.ratePerMonth);
const count = z.int().min(0).max(LIMITS.count);
const target = z.int().min(1).max(LIMITS.count);
const months = z.number().min(0).max(LIMITS.months);
const positiveMonths = z.number().positive().max(LIMITS.months);
const share = z.number().min(0).max(1);
const basis = z.enum(['plan', 'data']);
const weight = z.number().min(0).max(LIMITS.count);
const country = z.string().regex(/^[A-Z]{2}$/, 'Give a country as two capital letters (ISO 3166-1), for example PL.');

const siteSchema = z.strictObject({
  code,
  country,
  activatedOn: isoDate.nullish(),
  activationIsFirstPatient: z.boolean().optional(),
  planned: z.strictObject({ earliest: isoDate, likely: isoDate, latest: isoDate }).nullish(),
  closedOn: isoDate.nullish(),
  cap: count.nullish(),
  randomised: count.optional(),
  loggedThrough: isoDate.optional(),
  inScreening: count.optional(),
  unlogged: z.array(isoMonth).max(1_332).optional(),
  monthly: z
    .array(z.strictObject({ month: isoMonth, randomised: count }))
    .max(1_332)
    .optional(),
});

const enrolmentShape = {
  target,
  rate: z.strictObject({
    meanPerMonth: positiveRate,
    cv: z.number().min(LIMITS.cv.least).max(LIMITS.cv.most),
    basis,
  }),
  countryRates: z
    .array(z.strictObject({ country, meanPerMonth: positiveRate }))
    .max(300)
    .optional(),
  seasonality: z
    .array(z.number().min(0).max(LIMITS.ratePerMonth))
    .length(12, 'Give twelve multipliers, January first.')
    .optional(),
  rampUp: z.strictObject({ months, fraction: share }).optional(),
  ageing: z.strictObject({ basis, floor: share, months: positiveMonths }).optional(),
  calendar: z
    .array(
      z.strictObject({
        from: isoDate,
        to: isoDate,
        countries: z.array(country).max(300).optional(),
        sites: z.array(code).max(LIMITS.sites).optional(),
        multiplier: z.number().min(0).max(LIMITS.ratePerMonth),
      }),
    )
    .max(1_000)
    .optional(),
  countryCaps: z
    .array(z.strictObject({ country, cap: count }))
    .max(300)
    .optional(),
  screening: z.strictObject({ days: z.number().positive().max(3_660), passed: count, failed: count }).optional(),
};

/** One row of the blinded listing: no arm, ever. */
const subjectSchema = z.strictObject({
  id: z.string().min(1).max(100),
  site: code,
  randomisedOn: isoDate,
  status: z.enum(['event', 'event-pending', 'withdrawn', 'completed', 'at-risk']),
  statusOn: isoDate,
});

const aggregateSchema = z.strictObject({
  events: count,
  withdrawn: count,
  atRisk: count,
  personMonths: z
    .number()
    .min(0)
    .max(LIMITS.count * LIMITS.months),
});

const eventsShape = {
  model: z.strictObject({
    family: z.enum([
      'exponential',
      'weibull',
      'log-normal',
      'log-logistic',
      'gamma',
      'piecewise-exponential',
      'average',
    ]),
    medianMonths: positiveMonths,
    shape: z.number().min(LIMITS.shape.least).max(LIMITS.shape.most).optional(),
    cutsMonths: z.array(positiveMonths).min(1).max(50).optional(),
    cureFraction: z.number().min(0).lt(1).optional(),
    basis,
    priorEvents: weight,
  }),
  dropout: z.strictObject({ perMonth: z.number().min(0).max(LIMITS.ratePerMonth), basis, priorEvents: weight }),
  followUpMonths: positiveMonths.nullish(),
  adjudication: z
    .strictObject({ confirmed: count, refuted: count, medianLagDays: z.number().positive().max(3_660) })
    .optional(),
};

const milestoneShape = { code, name: z.string().min(1).max(200).optional(), plannedOn: isoDate.nullish() };
const milestoneSchema = z.discriminatedUnion(
  'kind',
  [
    z.strictObject({ ...milestoneShape, kind: z.literal('randomised'), count: target }),
    z.strictObject({ ...milestoneShape, kind: z.literal('events'), count: target }),
    z.strictObject({ ...milestoneShape, kind: z.literal('follow-up'), months }),
    z.strictObject({ ...milestoneShape, kind: z.literal('all-of'), of: z.array(code).min(1).max(LIMITS.milestones) }),
  ],
  'Give the kind: “randomised”, “events”, “follow-up” or “all-of”.',
);

const simulationSchema = z.strictObject({
  draws: z.int().min(1).max(LIMITS.draws).default(10_000),
  seed: z.int().min(0).max(4_294_967_295).default(1),
  horizonMonths: z.number().min(1).max(LIMITS.horizonMonths).default(120),
});

export const studyFileSchema = z.strictObject({
  format: z.literal('kalends-study/1'),
  study: z.strictObject({ code: z.string().min(1).max(100), title: z.string().max(1_000) }),
  dataCutoff: isoDate,
  enrolment: z.strictObject({ ...enrolmentShape, sites: z.array(siteSchema).min(1).max(LIMITS.sites) }),
  events: z
    .strictObject({
      ...eventsShape,
      subjects: z.array(subjectSchema).max(LIMITS.subjects).optional(),
      aggregate: aggregateSchema.optional(),
    })
    .optional(),
  milestones: z.array(milestoneSchema).min(1).max(LIMITS.milestones),
  simulation: simulationSchema.prefault({}),
}) satisfies z.ZodType<Study>;

const shareOfDraws = z.number().min(0).max(1);
const quantiles = <T extends z.ZodType>(value: T) =>
  z.strictObject(
    Object.fromEntries(QUANTILE_LEVELS.map((level) => [level, value])) as Record<(typeof QUANTILE_LEVELS)[number], T>,
  );
const countForecast = z.strictObject({ mean: z.number(), quantiles: quantiles(z.int()) });

export const forecastFileSchema = z.strictObject({
  format: z.literal('kalends-forecast/1'),
  engineVersion: z.string(),
  studySha256: z.string().regex(/^[0-9a-f]{64}$/),
  seed: z.int(),
  draws: z.int(),
  dataCutoff: isoDate,
  observed: z.strictObject({
    randomised: z.int(),
    events: z.int().nullable(),
    withdrawn: z.int().nullable(),
    atRisk: z.int().nullable(),
  }),
  fit: z.strictObject({
    enrolment: z
      .strictObject({ meanPerMonth: z.number(), shape: z.number().nullable(), logLikelihood: z.number() })
      .nullable(),
    events: z
      .array(
        z.strictObject({
          family: z.enum(['exponential', 'weibull', 'log-normal', 'log-logistic', 'gamma', 'piecewise-exponential']),
          weight: shareOfDraws,
          ratePerMonth: z.number().optional(),
          mu: z.number().optional(),
          sigma: z.number().optional(),
          shape: z.number().optional(),
          scaleMonths: z.number().optional(),
          ratesPerMonth: z.array(z.number()).optional(),
          medianMonths: z.number().nullable(),
          logLikelihood: z.number(),
          aic: z.number(),
        }),
      )
      .nullable(),
    dropout: z.strictObject({ perMonth: z.number() }).nullable(),
  }),
  milestones: z.array(
    z.strictObject({
      code: z.string(),
      name: z.string().optional(),
      kind: z.enum(['randomised', 'events', 'follow-up', 'all-of']),
      count: z.int().optional(),
      months: z.number().optional(),
      of: z.array(z.string()).optional(),
      plannedOn: isoDate.nullish(),
      reachedOn: isoDate.nullable(),
      probabilityReached: shareOfDraws,
      probabilityByPlanned: shareOfDraws.nullable(),
      quantiles: quantiles(isoDate.nullable()),
      monteCarloErrorDays: z.number().nullable(),
      density: z.array(z.strictObject({ from: isoDate, share: shareOfDraws })),
    }),
  ),
  monthly: z.array(z.strictObject({ monthEnd: isoDate, randomised: countForecast, events: countForecast.optional() })),
  cautions: z.array(
    z.strictObject({
      code: z.string(),
      text: z.string(),
      sponsorText: z.string(),
      milestones: z.array(z.string()).optional(),
    }),
  ),
}) satisfies z.ZodType<Forecast>;
