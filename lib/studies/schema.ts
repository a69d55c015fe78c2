import { z } from 'zod';
import { STUDY_ROLES } from '../auth/permissions';
import type { Enrolment, EventsPart, Milestone, Study } from '../engine/types';
import { instant, isoDate } from '../http/params';
import { eventFaults } from '../study-file/event-checks';
import { plainWords, schemaFaults, type StudyFileFault } from '../study-file/faults';
import { milestoneFaults } from '../study-file/milestone-checks';
import { asList, asMembers, asText } from '../study-file/readable';
import { studyFileSchema } from '../study-file/schema';
import { siteFaults } from '../study-file/site-checks';

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

/** The families that the engine computes and the screens offer; the study file's schema knows more. */
export const OFFERED_FAMILIES = ['exponential', 'weibull'] as const;

/** What a figure looks like, said where there is none or none that can be read. */
const EXAMPLES: Record<string, string> = {
  target: '1200',
  meanPerMonth: '0.55',
  cv: '0.8',
  months: '12',
  fraction: '0.5',
  count: '288',
  medianMonths: '20',
  shape: '1.1',
  cureFraction: '0.1',
  priorEvents: '5',
  perMonth: '0.02',
  followUpMonths: '24',
  draws: '10000',
  seed: '1',
  horizonMonths: '120',
};

/** The study file's own words, except where a form can say more. */
const sectionWords: z.core.$ZodErrorMap = (issue) => {
  const field = String(issue.path?.findLast((part) => typeof part === 'string') ?? '');
  if (issue.code === 'invalid_type' && EXAMPLES[field]) return `Give a number, for example ${EXAMPLES[field]}.`;
  if (issue.code === 'too_small' && field === 'of') return 'Choose the milestones that have to be reached.';
  return plainWords(issue);
};

const stepOf = (part: string): string | number =>
  /^\d+$/.test(part) ? Number(part) : part.replaceAll('~1', '/').replaceAll('~0', '~');

/** A part of the study file as a section of the plan: checked by the contract's own schema, every fault at once and in plain words. */
function section<T extends z.ZodType>(part: T, further: (value: unknown) => StudyFileFault[]) {
  return z.unknown().transform((value, context): z.output<T> => {
    const parsed = part.safeParse(value, { error: sectionWords });
    const own = further(value);
    const said = new Set(own.map(({ pointer }) => pointer));
    const plain = parsed.success ? [] : schemaFaults(parsed.error).filter(({ pointer }) => !said.has(pointer));
    const faults = [...plain, ...own];
    for (const { pointer, detail } of faults)
      context.addIssue({ code: 'custom', path: pointer.split('/').slice(1).map(stepOf), message: detail });
    return parsed.success ? parsed.data : z.NEVER;
  });
}

/** Checks of the whole file, for what one part of it can tell; pointers begin at that part. */
const faultsWithin = (part: string, faults: StudyFileFault[]): StudyFileFault[] =>
  faults
    .filter(({ pointer }) => pointer.startsWith(part))
    .map(({ pointer, detail }) => ({ pointer: pointer.slice(part.length), detail }));

function familyFaults(events: unknown): StudyFileFault[] {
  const family = asText(asMembers(asMembers(events).model).family);
  if (family === null || (OFFERED_FAMILIES as readonly string[]).includes(family)) return [];
  return [{ pointer: '/model/family', detail: 'Choose exponential or weibull.' }];
}

/** A file may leave names out; on the screens a milestone is called by its own. */
function nameFaults(milestones: unknown): StudyFileFault[] {
  return asList(milestones).flatMap((milestone, place) => {
    const { name } = asMembers(milestone);
    return name === undefined || (typeof name === 'string' && name.trim() === '')
      ? [{ pointer: `/${place}/name`, detail: 'Give the milestone a name, for example Interim analysis.' }]
      : [];
  });
}

const file = studyFileSchema.shape;

export const SECTION_SCHEMAS = {
  enrolment: section(file.enrolment.omit({ sites: true, screening: true }), (enrolment) =>
    faultsWithin('/enrolment', siteFaults({ enrolment })),
  ),
  events: section(file.events.unwrap().omit({ subjects: true, aggregate: true }).nullable(), (events) => [
    ...familyFaults(events),
    ...faultsWithin('/events', eventFaults({ events: events && { ...asMembers(events), subjects: [] } })).filter(
      ({ pointer }) => pointer.startsWith('/model'),
    ),
  ]),
  milestones: section(file.milestones, (milestones) => [
    ...nameFaults(milestones),
    ...faultsWithin('/milestones', milestoneFaults({ milestones, events: {} })),
  ]),
  simulation: section(file.simulation.unwrap(), () => []),
} as const satisfies Record<PlanSection, z.ZodType>;

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

const sectionBody = <S extends PlanSection, T extends z.ZodType>(name: S, value: T) =>
  z.strictObject({ section: z.literal(name), version: z.number().int().min(0), value });

export const savePlanSectionBody = z.discriminatedUnion('section', [
  sectionBody('enrolment', SECTION_SCHEMAS.enrolment),
  sectionBody('events', SECTION_SCHEMAS.events),
  sectionBody('milestones', SECTION_SCHEMAS.milestones),
  sectionBody('simulation', SECTION_SCHEMAS.simulation),
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
