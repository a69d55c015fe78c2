import { z } from 'zod';
import { instant } from '../http/params';

export const auditEntrySchema = z.strictObject({
  sequence: z.number(),
  at: instant,
  actorName: z.string(),
  actorRole: z.string(),
  action: z.string(),
  recordType: z.string(),
  recordId: z.string(),
  changes: z.array(z.strictObject({ field: z.string(), old: z.unknown(), new: z.unknown() })),
  reason: z.string().nullable(),
  source: z.string(),
  digest: z.string(),
});
export type AuditEntryView = z.infer<typeof auditEntrySchema>;

/** Dates narrow the trail; the person is matched by part of the name, the kind by its beginning (`site-log`). */
export const auditQuery = z.strictObject({
  page: z.coerce.number().int().min(1).max(100_000).default(1),
  size: z.coerce.number().int().min(1).max(200).default(50),
  from: z.iso.date('Give a calendar date, for example 2027-03-14.').optional(),
  to: z.iso.date('Give a calendar date, for example 2027-03-14.').optional(),
  person: z.string().trim().max(200).optional(),
  kind: z
    .string()
    .trim()
    .max(40)
    .regex(/^[a-z-]*$/, 'Choose a kind from the list.')
    .optional(),
});
export type AuditQuery = z.infer<typeof auditQuery>;
