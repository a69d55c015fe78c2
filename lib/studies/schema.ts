import { z } from 'zod';
import { STUDY_ROLES } from '../auth/permissions';
import { isCountryCode } from '../countries';
import type { Enrolment, EventsPart, Milestone, Study } from '../engine/types';
import { instant, isoDate } from '../http/params';

/** What a plan version holds: the study file's own parts, without the sites and the data. Names are the contract's. */
export interface Plan {
  enrolment: Omit<Enrolment, 'sites' | 'screening'>;
  events: Omit<EventsPart, 'subjects' | 'aggregate'> | null;
  milestones: Milestone[];
  simulation: Study['simulation'];
}

export const PLAN_SECTIONS = ['enrolment', 'events', 'milestones', 'simulation'] as const;
export type PlanSection = (typeof PLAN_SECTIONS)[number];

/** A draft is kept section by section. `versions` counts each section's saves, so that two people on two sections both win. */
export interface PlanDraftSections {
  enrolment?: unknown;
  events?: unknown;
  milestones?: unknown;
  simulation?: unknown;
  versions?: Partial<Record<PlanSection, number>>;
}

/** Why a plan changes once a run exists. */
export const PLAN_REASONS = ['protocol-amendment', 'site-list', 'assumption'] as const;
export type PlanReason = (typeof PLAN_REASONS)[number];

export const PLAN_REASON_NAMES: Record<PlanReason, string> = {
  'protocol-amendment': 'protocol amendment',
  'site-list': 'sites added or dropped',
  assumption: 'assumption revised',
};

const between = (low: number, high: number, example: string) =>
  z
    .number(`Give a number, for example ${example}.`)
    .min(low, `At least ${low}.`)
    .max(high, `At most ${high.toLocaleString('en-GB')}.`);
const above = (floor: number, high: number, example: string) =>
  z
    .number(`Give a number, for example ${example}.`)
    .gt(floor, `Above ${floor}, for example ${example}.`)
    .max(high, `At most ${high.toLocaleString('en-GB')}.`);
const whole = (low: number, high: number, example: string) => between(low, high, example).int('Whole numbers only.');

const planDate = isoDate.refine(
  (date) => date >= '1990-01-01' && date <= '2100-12-31',
  'Give a day between 1990 and 2100.',
);
const country = z.string().refine(isCountryCode, 'Choose a country.');
const basis = z.enum(['plan', 'data'], 'Say whether the plan is taken as known or the data decide.');
const siteCode = z.string().min(1).max(40);

const oncePerCountry = (rows: { country: string }[], context: z.RefinementCtx): void => {
  rows.forEach((row, place) => {
    if (rows.findIndex((other) => other.country === row.country) < place)
      context.addIssue({
        code: 'custom',
        path: [place, 'country'],
        message: 'This country stands above already. Once is enough.',
      });
  });
};

export const enrolmentSection = z.strictObject({
  target: whole(1, 1_000_000, '1200'),
  rate: z.strictObject({ meanPerMonth: above(0, 1000, '0.55'), cv: between(0.01, 10, '0.8'), basis }),
  countryRates: z
    .array(z.strictObject({ country, meanPerMonth: above(0, 1000, '0.55') }))
    .max(249)
    .superRefine(oncePerCountry)
    .optional(),
  seasonality: z
    .array(between(0, 1000, '0.7'))
    .length(12, 'Give a share for each of the twelve months.')
    .refine(
      (months) => months.every((share) => !Number.isFinite(share)) || months.some((share) => share > 0),
      'At least one month has to be above 0.',
    )
    .optional(),
  rampUp: z.strictObject({ months: between(0, 1200, '2'), fraction: between(0, 1, '0.5') }).optional(),
  ageing: z.strictObject({ basis, floor: between(0, 1, '0.5'), months: above(0, 1200, '8') }).optional(),
  calendar: z
    .array(
      z
        .strictObject({
          from: planDate,
          to: planDate,
          countries: z.array(country).max(249).optional(),
          sites: z.array(siteCode).max(5000).optional(),
          multiplier: between(0, 1000, '0'),
        })
        .refine((pause) => pause.from <= pause.to, { path: ['to'], message: 'The last day lies before the first.' }),
    )
    .max(200)
    .optional(),
  countryCaps: z
    .array(z.strictObject({ country, cap: whole(0, 1_000_000, '150') }))
    .max(249)
    .superRefine(oncePerCountry)
    .optional(),
});

/** The families that the screens offer so far; the study file knows more. */
export const OFFERED_FAMILIES = ['exponential', 'weibull'] as const;

export const eventsSection = z
  .strictObject({
    model: z.strictObject({
      family: z.enum(OFFERED_FAMILIES, 'Choose exponential or Weibull.'),
      medianMonths: above(0, 1200, '20'),
      shape: between(0.05, 20, '1.1').optional(),
      cureFraction: z
        .number('Give a share, for example 0.1.')
        .min(0, 'At least 0.')
        .lt(1, 'Below 1: some have the event.')
        .optional(),
      basis,
      priorEvents: between(0, 1_000_000, '5'),
    }),
    dropout: z.strictObject({ perMonth: between(0, 1000, '0.02'), basis, priorEvents: between(0, 1_000_000, '5') }),
    followUpMonths: above(0, 1200, '24').nullable().optional(),
    adjudication: z
      .strictObject({
        confirmed: whole(0, 1_000_000, '120'),
        refuted: whole(0, 1_000_000, '8'),
        medianLagDays: above(0, 36_525, '45'),
      })
      .optional(),
  })
  .nullable();

const milestoneBase = {
  code: z
    .string()
    .trim()
    .min(1, 'Give a short code, for example IA.')
    .max(40, 'At most 40 characters.')
    .regex(/^[^\p{Cc}]*$/u, 'Write it on one line.'),
  name: z
    .string()
    .trim()
    .min(1, 'Give the milestone a name, for example Interim analysis.')
    .max(200, 'At most 200 characters.')
    .regex(/^[^\p{Cc}]*$/u, 'Write it on one line.'),
  plannedOn: planDate.nullable().optional(),
};

export const milestoneSchema = z.discriminatedUnion(
  'kind',
  [
    z.strictObject({ ...milestoneBase, kind: z.literal('randomised'), count: whole(1, 1_000_000, '1200') }),
    z.strictObject({ ...milestoneBase, kind: z.literal('events'), count: whole(1, 1_000_000, '288') }),
    z.strictObject({ ...milestoneBase, kind: z.literal('follow-up'), months: between(0, 1200, '12') }),
    z.strictObject({
      ...milestoneBase,
      kind: z.literal('all-of'),
      of: z.array(z.string()).min(1, 'Choose the milestones that have to be reached.').max(50),
    }),
  ],
  'Choose what the milestone waits for.',
);

type Parts = ReadonlyMap<string, readonly string[]>;

/** Whether following a milestone's parts leads back to it. */
function leadsBack(parts: Parts, start: string, at = start, seen = new Set<string>()): boolean {
  return (parts.get(at) ?? []).some((part) => {
    if (part === start) return true;
    if (seen.has(part)) return false;
    seen.add(part);
    return leadsBack(parts, start, part, seen);
  });
}

/** Codes given twice, parts that no milestone has, circles. */
function refuseTangles(milestones: z.infer<typeof milestoneSchema>[], context: z.RefinementCtx): void {
  const refuse = (path: PropertyKey[], message: string): void => context.addIssue({ code: 'custom', path, message });
  const parts: Parts = new Map(milestones.map((one) => [one.code, one.kind === 'all-of' ? one.of : []]));
  milestones.forEach((milestone, place) => {
    if (milestones.findIndex((other) => other.code === milestone.code) < place)
      refuse([place, 'code'], `${milestone.code} is another milestone’s code already. Give this one its own.`);
    if (milestone.kind !== 'all-of') return;
    if (milestone.of.some((part) => !parts.has(part)))
      refuse([place, 'of'], 'One of its parts is no milestone of this plan. Choose among those above.');
    else if (leadsBack(parts, milestone.code))
      refuse([place, 'of'], 'It waits for itself in a circle. Leave one part out.');
  });
}

export const milestonesSection = z
  .array(milestoneSchema)
  .min(1, 'Add at least one milestone: a forecast is a forecast of something.')
  .max(50, 'At most 50 milestones.')
  .superRefine(refuseTangles);

export const simulationSection = z.strictObject({
  draws: whole(100, 1_000_000, '10000'),
  seed: whole(0, 4_294_967_295, '1'),
  horizonMonths: whole(1, 600, '120'),
});

export const SECTION_SCHEMAS = {
  enrolment: enrolmentSection,
  events: eventsSection,
  milestones: milestonesSection,
  simulation: simulationSection,
} as const satisfies Record<PlanSection, z.ZodType>;

export const planSchema = z.strictObject(SECTION_SCHEMAS);

/** A section as the draft has it: what stands there (null: nothing yet) and how often it was saved. */
const sectionState = z.strictObject({ value: z.unknown(), version: z.number() });
export interface SectionState {
  value?: unknown;
  version: number;
}

const planVersionHead = z.strictObject({
  number: z.number(),
  createdAt: instant,
  createdBy: z.string(),
  reasonKind: z.enum(PLAN_REASONS).nullable(),
  reason: z.string().nullable(),
});
export type PlanVersionHead = z.infer<typeof planVersionHead>;

/** Plans were checked when they were saved; they leave as they stand. */
const storedPlan = z.custom<Plan>((value) => typeof value === 'object' && value !== null);

export const planVersionSchema = planVersionHead.extend({ plan: storedPlan });
export type PlanVersionView = z.infer<typeof planVersionSchema>;

const planSite = z.strictObject({
  code: z.string(),
  country: z.string(),
  earliest: isoDate,
  likely: isoDate,
  latest: isoDate,
  cap: z.number().nullable(),
});
/** A site as the plan alone knows it: when it opens. One without a planned window opens on its day of activation. */
export type PlanSite = z.infer<typeof planSite>;

export const planViewSchema = z.strictObject({
  study: z.strictObject({ code: z.string(), title: z.string(), sponsorName: z.string() }),
  maySave: z.boolean(),
  current: planVersionSchema.nullable(),
  sections: z.strictObject({
    enrolment: sectionState,
    events: sectionState,
    milestones: sectionState,
    simulation: sectionState,
  }),
  /** Sections that have been saved at all: an events section may say null, "no events". */
  saved: z.array(z.enum(PLAN_SECTIONS)),
  /** When and by whom the draft was last saved; null where it is as the current version. */
  draft: z.strictObject({ savedAt: instant, savedBy: z.string() }).nullable(),
  /** Newest first, at most 100. */
  versions: z.array(planVersionHead),
  hasRun: z.boolean(),
  sites: z.array(planSite),
  today: isoDate,
});
export type PlanView = z.infer<typeof planViewSchema>;

const sectionBody = <S extends PlanSection, T extends z.ZodType>(section: S, value: T) =>
  z.strictObject({ section: z.literal(section), version: z.number().int().min(0), value });

export const savePlanSectionBody = z.discriminatedUnion('section', [
  sectionBody('enrolment', enrolmentSection),
  sectionBody('events', eventsSection),
  sectionBody('milestones', milestonesSection),
  sectionBody('simulation', simulationSection),
]);
export type SavePlanSectionBody = z.infer<typeof savePlanSectionBody>;

export const savedSectionSchema = sectionState.extend({
  section: z.enum(PLAN_SECTIONS),
  savedAt: instant,
  savedBy: z.string(),
});
export type SavedSection = z.infer<typeof savedSectionSchema>;

const sectionVersions = z.strictObject({
  enrolment: z.number().int(),
  events: z.number().int(),
  milestones: z.number().int(),
  simulation: z.number().int(),
});

export const savePlanVersionBody = z.strictObject({
  /** The version that stood when the form was opened (0: none) and the sections that it showed. */
  baseNumber: z.number().int().min(0),
  sectionVersions,
  reasonKind: z.enum(PLAN_REASONS, 'Choose why the plan changes.').nullable().default(null),
  reason: z.string().trim().max(2000, 'At most 2,000 characters.').nullable().default(null),
});
export type SavePlanVersionBody = z.infer<typeof savePlanVersionBody>;

export const comparisonQuery = z.strictObject({
  from: z.coerce.number().int('Give a version’s number.').min(1, 'Versions count from 1.'),
  to: z.coerce.number().int('Give a version’s number.').min(1, 'Versions count from 1.'),
});

export const planDifference = z.strictObject({
  field: z.string(),
  label: z.string(),
  old: z.string(),
  new: z.string(),
});
export type PlanDifference = z.infer<typeof planDifference>;

export const comparisonSchema = z.strictObject({
  from: planVersionHead,
  to: planVersionHead,
  differences: z.array(planDifference),
});
export type PlanComparison = z.infer<typeof comparisonSchema>;

const line = (what: string, most: number) =>
  z
    .string()
    .trim()
    .min(1, `Give ${what}.`)
    .max(most, `At most ${most} characters.`)
    .regex(/^[^\p{Cc}]*$/u, 'Write it on one line.');

/** A code goes into addresses, file names and the study file. */
export const createStudyBody = z.strictObject({
  code: z
    .string()
    .trim()
    .min(1, 'Give the study’s code.')
    .regex(
      /^[A-Za-z0-9][A-Za-z0-9._-]{0,39}$/,
      'A code has up to 40 letters, digits, full stops, hyphens or underscores, for example KLD-301.',
    ),
  title: line('the study’s title', 200),
  sponsorName: line('the sponsor’s name', 200),
});
export type CreateStudyBody = z.infer<typeof createStudyBody>;

export const studySchema = createStudyBody.extend({ createdAt: instant });
export type StudyView = z.infer<typeof studySchema>;

/** The sections of a study that a role sees, with what stands in each now. Null: the section is not this role's. */
export const studyFrameSchema = z.strictObject({
  code: z.string(),
  title: z.string(),
  sponsorName: z.string(),
  role: z.enum([...STUDY_ROLES, 'owner']),
  isDemonstration: z.boolean(),
  rail: z.array(
    z.strictObject({ section: z.string(), label: z.string(), value: z.string().nullable(), caution: z.boolean() }),
  ),
});
export type StudyFrame = z.infer<typeof studyFrameSchema>;
