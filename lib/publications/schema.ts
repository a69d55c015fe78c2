import { z } from 'zod';
import type { IsoDate, MilestoneForecast, MonthlyRow } from '../engine/types';
import { instant, isoDate } from '../http/params';

/** What readers of a publication see, and all that they see: nothing by site, nothing by treatment. */
export interface PublishedForecast {
  study: { code: string; title: string; sponsorName: string };
  dataCutoff: IsoDate;
  runNumber: number;
  observed: { randomised: number; events: number | null };
  /** Cumulative study totals at month ends up to the cut-off. */
  observedMonthly: { monthEnd: IsoDate; randomised: number; events: number | null }[];
  milestones: MilestoneForecast[];
  monthly: MonthlyRow[];
  /** The sponsor's wording, with the milestones each touches. */
  cautions: { code: string; text: string; milestones: string[] }[];
  provenance: { engineVersion: string; studySha256: string; seed: number; draws: number };
}

const count = z.number();
const quantilesOf = <T extends z.ZodType>(value: T) =>
  z.strictObject({
    '0.025': value,
    '0.05': value,
    '0.1': value,
    '0.25': value,
    '0.5': value,
    '0.75': value,
    '0.9': value,
    '0.95': value,
    '0.975': value,
  });

const milestoneFields = {
  code: z.string(),
  name: z.string().optional(),
  kind: z.enum(['randomised', 'events', 'follow-up', 'all-of']),
  count: count.optional(),
  months: z.number().optional(),
  of: z.array(z.string()).optional(),
  plannedOn: isoDate.nullable().optional(),
  reachedOn: isoDate.nullable(),
  probabilityReached: z.number(),
  probabilityByPlanned: z.number().nullable(),
  quantiles: quantilesOf(isoDate.nullable()),
  monteCarloErrorDays: z.number().nullable(),
};
const publishedMilestone = z.strictObject({
  ...milestoneFields,
  density: z.array(z.strictObject({ from: isoDate, share: z.number() })),
});
/** A list of publications leaves the densities out: they are most of the bytes. */
const listedMilestone = z.strictObject(milestoneFields);

const countForecast = z.strictObject({ mean: z.number(), quantiles: quantilesOf(count) });

/** Strict on purpose: a field that is not named here cannot be published. */
export const publishedForecastSchema: z.ZodType<PublishedForecast> = z.strictObject({
  study: z.strictObject({ code: z.string(), title: z.string(), sponsorName: z.string() }),
  dataCutoff: isoDate,
  runNumber: count,
  observed: z.strictObject({ randomised: count, events: count.nullable() }),
  observedMonthly: z.array(z.strictObject({ monthEnd: isoDate, randomised: count, events: count.nullable() })),
  milestones: z.array(publishedMilestone),
  monthly: z.array(z.strictObject({ monthEnd: isoDate, randomised: countForecast, events: countForecast.optional() })),
  cautions: z.array(z.strictObject({ code: z.string(), text: z.string(), milestones: z.array(z.string()) })),
  provenance: z.strictObject({ engineVersion: z.string(), studySha256: z.string(), seed: count, draws: count }),
});

export const NOTE_LENGTH = 2000;

/** `confirm` is the confirmation which names the readers: a forecast leaves the building only after it was shown. */
export const publishBody = z.strictObject({
  runNumber: z.number('Choose a run.').int('Choose a run.').min(1, 'Choose a run.').max(1_000_000, 'Choose a run.'),
  note: z
    .string('Write a note for the readers.')
    .trim()
    .min(1, 'Write a note for the readers: what moved, and why.')
    .max(NOTE_LENGTH, `Keep the note within ${NOTE_LENGTH.toLocaleString('en-GB')} characters.`),
  confirm: z.literal(true, 'Confirm who will read it.'),
});
export type PublishBody = z.infer<typeof publishBody>;

export const publicationsQuery = z.strictObject({
  page: z.coerce.number().int('Give a whole number.').min(1).max(100_000).default(1),
  size: z.coerce.number().int('Give a whole number.').min(1).max(50).default(12),
});
export type PublicationsQuery = z.infer<typeof publicationsQuery>;

export const acknowledgementSchema = z.strictObject({ name: z.string(), acknowledgedAt: instant.nullable() });
export type Acknowledgement = z.infer<typeof acknowledgementSchema>;

export const publicationSchema = z.strictObject({
  number: count,
  publishedAt: instant,
  publishedBy: z.string(),
  note: z.string(),
  content: publishedForecastSchema,
  auditDigest: z.string(),
  /** The publication that took this one's place; null for the one that stands. */
  supersededBy: z.strictObject({ number: count, publishedAt: instant }).nullable(),
  /** When the reader acknowledged its cautions. */
  acknowledgedAt: instant.nullable(),
  /** The sponsor's readers and whether they did; null for those who are not told. */
  acknowledgements: z.array(acknowledgementSchema).nullable(),
});
export type PublicationView = z.infer<typeof publicationSchema>;

export const publicationHeadSchema = z.strictObject({
  number: count,
  publishedAt: instant,
  publishedBy: z.string(),
  note: z.string(),
  dataCutoff: isoDate,
  runNumber: count,
  milestones: z.array(listedMilestone),
});
export type PublicationHead = z.infer<typeof publicationHeadSchema>;

/** Who will see a publication, by role, for the confirmation. */
export interface ReaderCount {
  role: 'statistician' | 'manager' | 'sponsor';
  count: number;
}

/** What the timeline's address may ask for; anything else is as if it had not been asked. */
export const timelineSearch = z.object({
  milestone: z.string().max(40).optional().catch(undefined),
  page: z.coerce.number().int().min(1).max(100_000).catch(1),
});
