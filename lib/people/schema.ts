import { z } from 'zod';
import { STUDY_ROLES } from '../auth/permissions';
import { instant } from '../http/params';

export const PASSWORD_LENGTH = { least: 12, most: 200 } as const;
export const INVITATION_DAYS = 7;

const name = z
  .string()
  .trim()
  .min(1, 'Give the person’s name.')
  .max(200, 'A name has at most 200 characters.')
  .regex(/^[^\r\n\t]*$/, 'A name is one line.');
const email = z
  .string()
  .trim()
  .toLowerCase()
  .pipe(z.email('Give an e-mail address, for example name@company.example.'))
  .pipe(z.string().max(254, 'An address has at most 254 characters.'));

export const invitePersonBody = z
  .strictObject({
    name,
    email,
    role: z.enum(STUDY_ROLES, 'Choose a role.'),
    siteCode: z.string().trim().max(40).optional(),
  })
  .superRefine((body, context) => {
    if (body.role === 'coordinator' && !body.siteCode)
      context.addIssue({ code: 'custom', path: ['siteCode'], message: 'Choose the coordinator’s site.' });
    if (body.role !== 'coordinator' && body.siteCode)
      context.addIssue({
        code: 'custom',
        path: ['siteCode'],
        message: 'Only a site coordinator has a site. Leave it empty.',
      });
  });
export type InvitePersonBody = z.infer<typeof invitePersonBody>;

export const inviteOwnerBody = z.strictObject({ name, email });

export const password = z
  .string()
  .min(
    PASSWORD_LENGTH.least,
    `A password has at least ${PASSWORD_LENGTH.least} characters. A few words in a row are fine.`,
  )
  .max(PASSWORD_LENGTH.most, `A password has at most ${PASSWORD_LENGTH.most} characters.`);

export const acceptInvitationBody = z.strictObject({ token: z.string().min(20).max(200), name, password });
export const joinBody = z.strictObject({ token: z.string().min(20).max(200) });

export const memberSchema = z.strictObject({
  id: z.uuid(),
  name: z.string(),
  email: z.string(),
  role: z.enum(STUDY_ROLES),
  siteCode: z.string().nullable(),
  since: instant,
});
export type Member = z.infer<typeof memberSchema>;

export const invitationSchema = z.strictObject({
  id: z.uuid(),
  name: z.string(),
  email: z.string(),
  role: z.enum([...STUDY_ROLES, 'owner']),
  siteCode: z.string().nullable(),
  expiresAt: instant,
  isExpired: z.boolean(),
});
export type PendingInvitation = z.infer<typeof invitationSchema>;

export const peopleSchema = z.strictObject({ members: z.array(memberSchema), invitations: z.array(invitationSchema) });
export type People = z.infer<typeof peopleSchema>;

/** What the person who follows an invitation's link is told before they accept. */
export const invitationViewSchema = z.strictObject({
  organisationName: z.string(),
  studyTitle: z.string().nullable(),
  roleName: z.string(),
  name: z.string(),
  email: z.string(),
  hasAccount: z.boolean(),
});
export type InvitationView = z.infer<typeof invitationViewSchema>;
