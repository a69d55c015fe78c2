import { z } from 'zod';
import { STUDY_ROLES, roleMay, type StudyRole } from '../auth/permissions';
import { MAIL_STATES } from '../email/schema';
import { instant } from '../http/params';

/** When a rule speaks. `nears`: within so many weeks at such a probability; `slips`: median later by so many days than last published. */
export const alertConditionSchema = z.discriminatedUnion(
  'kind',
  [
    z.strictObject({
      kind: z.literal('nears'),
      withinWeeks: z
        .number('Give whole weeks, for example 8.')
        .int('Give whole weeks, for example 8.')
        .min(1, 'At least 1 week.')
        .max(104, 'At most 104 weeks.'),
      /** A share from 0 to 1. */
      probability: z
        .number('Give a percentage, for example 80.')
        .min(0.01, 'At least 1 %.')
        .max(0.99, 'At most 99 %: a forecast is never certain.'),
    }),
    z.strictObject({
      kind: z.literal('slips'),
      days: z
        .number('Give whole days, for example 14.')
        .int('Give whole days, for example 14.')
        .min(1, 'At least 1 day.')
        .max(365, 'At most 365 days.'),
    }),
    z.strictObject({ kind: z.literal('reached') }),
  ],
  'Choose when the rule speaks.',
);
export type AlertCondition = z.infer<typeof alertConditionSchema>;

export interface AlertRecipients {
  roles: StudyRole[];
  personIds: string[];
}

/** Only those who may read publications are ever told of one. */
export const ALERT_ROLES = STUDY_ROLES.filter((role) => roleMay(role, 'publications:read'));

const once = <T>(values: T[]): T[] => [...new Set(values)];

export const alertRecipientsSchema = z
  .strictObject({
    roles: z
      .array(
        z.enum(STUDY_ROLES, 'Choose roles of the list.').refine((role) => ALERT_ROLES.includes(role), {
          message: 'A site coordinator sees no forecast and is not told of one.',
        }),
      )
      .max(STUDY_ROLES.length)
      .transform(once),
    personIds: z.array(z.uuid('Choose people of the list.')).max(100, 'At most 100 people.').transform(once),
  })
  .refine(({ roles, personIds }) => roles.length + personIds.length > 0, 'Choose who is told: a role or a person.');

/** What was said, as it was said: published figures only. */
export interface AlertContent {
  milestoneCode: string;
  milestoneName: string;
  condition: AlertCondition;
  publicationNumber: number;
  /** The news, as a sentence. */
  headline: string;
}

const ruleFields = {
  milestoneCode: z.string('Choose a milestone.').trim().min(1, 'Choose a milestone.').max(40, 'Choose a milestone.'),
  condition: alertConditionSchema,
  recipients: alertRecipientsSchema,
  isActive: z.boolean(),
};

export const addAlertRuleBody = z.strictObject(ruleFields);
export type AddAlertRuleBody = z.infer<typeof addAlertRuleBody>;

export const changeAlertRuleBody = z.strictObject({ ...ruleFields, version: z.number().int().min(1) });
export type ChangeAlertRuleBody = z.infer<typeof changeAlertRuleBody>;

export const deleteAlertRuleQuery = z.strictObject({ version: z.coerce.number().int().min(1) });

export const alertRuleSchema = z.strictObject({
  id: z.uuid(),
  milestoneCode: z.string(),
  milestoneName: z.string(),
  /** False when the plan has dropped the milestone since. */
  isPlanned: z.boolean(),
  condition: alertConditionSchema,
  recipients: z.strictObject({ roles: z.array(z.enum(STUDY_ROLES)), personIds: z.array(z.uuid()) }),
  isActive: z.boolean(),
  /** How often it has spoken; one that has is kept with what it said. */
  raised: z.number(),
  createdAt: instant,
  version: z.number(),
});
export type AlertRuleView = z.infer<typeof alertRuleSchema>;

export const alertRulesSchema = z.strictObject({
  rules: z.array(alertRuleSchema),
  milestones: z.array(z.strictObject({ code: z.string(), name: z.string() })),
  readers: z.array(z.strictObject({ id: z.uuid(), name: z.string(), role: z.enum(STUDY_ROLES) })),
});
export type AlertRules = z.infer<typeof alertRulesSchema>;

export const sentAlertSchema = z.strictObject({
  id: z.uuid(),
  raisedAt: instant,
  headline: z.string(),
  publicationNumber: z.number(),
  mails: z.array(
    z.strictObject({
      name: z.string(),
      state: z.enum(MAIL_STATES),
      attempts: z.number(),
      sentAt: instant.nullable(),
      lastError: z.string().nullable(),
    }),
  ),
});
export type SentAlert = z.infer<typeof sentAlertSchema>;

export const sentAlertsQuery = z.strictObject({
  page: z.coerce.number().int('Give a whole number.').min(1).max(100_000).default(1),
  size: z.coerce.number().int('Give a whole number.').min(1).max(50).default(20),
});
export type SentAlertsQuery = z.infer<typeof sentAlertsQuery>;
