import { randomBytes, randomUUID } from 'node:crypto';
import { hashPassword } from 'better-auth/crypto';
import { type CommandContext, recordAudit } from '../audit/record';
import { ROLE_NAMES } from '../auth/permissions';
import type { Actor, OrganisationScope, PersonScope, StudyScope } from '../auth/scope';
import { setTenancy } from '../db/transaction';
import { queueMail } from '../email/commands';
import { env } from '../env';
import { ConflictError, ForbiddenError, InvalidError, NotFoundError } from '../errors';
import { Account } from '../../entities/account';
import { Invitation, type InvitationRow } from '../../entities/invitation';
import { OrganisationMember } from '../../entities/organisation-member';
import { Person } from '../../entities/person';
import { Site } from '../../entities/site';
import { Study } from '../../entities/study';
import { StudyMember } from '../../entities/study-member';
import { hashToken, mayInvite, passwordFault } from './rules';
import { INVITATION_DAYS, type InvitePersonBody } from './schema';

interface Invited {
  organisationId: string;
  organisationName: string;
  studyId: string | null;
  studyTitle: string | null;
  siteId: string | null;
  role: InvitationRow['role'];
  name: string;
  email: string;
}

export async function invitePerson(
  scope: StudyScope<'people:invite'>,
  { body }: { body: InvitePersonBody },
  context: CommandContext,
): Promise<{ id: string }> {
  const { em } = context;
  if (!mayInvite(scope.role, body.role)) {
    throw new ForbiddenError(
      `A ${ROLE_NAMES[scope.role]} invites site coordinators and sponsor viewers; ask an owner of the organisation to invite a ${ROLE_NAMES[body.role]}.`,
    );
  }
  const site = body.siteCode
    ? await em.findOne(Site, { organisationId: scope.organisationId, studyId: scope.studyId, code: body.siteCode })
    : null;
  if (body.siteCode && !site)
    throw new InvalidError([
      { pointer: '/siteCode', detail: `There is no site ${body.siteCode} in this study. Choose one of its sites.` },
    ]);
  const [member] = await em.execute<{ role: InvitationRow['role'] }[]>(
    `select m.role from study_member m join person p on p.id = m.person_id where m.organisation_id = ? and m.study_id = ? and lower(p.email) = ?`,
    [scope.organisationId, scope.studyId, body.email],
  );
  if (member)
    throw new ConflictError(`${body.email} already has a role in ${scope.studyCode}: ${ROLE_NAMES[member.role]}.`);
  const open = await em.findOne(Invitation, {
    organisationId: scope.organisationId,
    studyId: scope.studyId,
    email: body.email,
    acceptedAt: null,
    revokedAt: null,
    expiresAt: { $gt: context.clock.now() },
  });
  if (open) throw new ConflictError(`${body.email} is invited already. Take that invitation back to send another.`);
  const study = await em.findOneOrFail(Study, { organisationId: scope.organisationId, id: scope.studyId });
  return invite(
    scope,
    {
      ...scope,
      studyTitle: `${study.code}, ${study.title}`,
      siteId: site?.id ?? null,
      role: body.role,
      name: body.name,
      email: body.email,
    },
    context,
  );
}

export async function inviteOwner(
  scope: OrganisationScope<'organisation:invite'>,
  { body }: { body: { name: string; email: string } },
  context: CommandContext,
): Promise<{ id: string }> {
  const invited = {
    organisationId: scope.organisationId,
    organisationName: scope.organisationName,
    studyId: null,
    studyTitle: null,
    siteId: null,
    role: 'owner' as const,
    ...body,
  };
  const open = await context.em.findOne(Invitation, {
    organisationId: scope.organisationId,
    studyId: null,
    email: body.email,
    acceptedAt: null,
    revokedAt: null,
    expiresAt: { $gt: context.clock.now() },
  });
  if (open) throw new ConflictError(`${body.email} is invited already.`);
  return invite(scope, invited, context);
}

async function invite(
  scope: { actor: Actor; role: string },
  invited: Invited,
  context: CommandContext,
): Promise<{ id: string }> {
  const { em, clock } = context;
  const token = randomBytes(32).toString('base64url');
  const expiresAt = new Date(clock.now().getTime() + INVITATION_DAYS * 86_400_000);
  const id = randomUUID();
  em.persist(
    em.create(Invitation, {
      id,
      organisationId: invited.organisationId,
      studyId: invited.studyId,
      siteId: invited.siteId,
      role: invited.role,
      email: invited.email,
      name: invited.name,
      tokenHash: hashToken(token),
      expiresAt,
      invitedBy: scope.actor.personId,
      createdAt: clock.now(),
    }),
  );
  await em.flush();
  await recordAudit(
    context,
    { ...scope, organisationId: invited.organisationId, studyId: invited.studyId },
    {
      action: 'people:invite',
      recordType: 'invitation',
      recordId: id,
      changes: [
        { field: 'role', old: null, new: invited.role },
        { field: 'email', old: null, new: invited.email },
      ],
    },
  );
  await queueMail(context, {
    organisationId: invited.organisationId,
    studyId: invited.studyId,
    alertId: null,
    recipient: invited.email,
    recipientName: invited.name,
    subject: `${scope.actor.name} invites you to ${invited.studyTitle?.split(',')[0] ?? invited.organisationName}`,
    template: {
      kind: 'invitation',
      organisationName: invited.organisationName,
      studyTitle: invited.studyTitle,
      roleName: ROLE_NAMES[invited.role],
      inviterName: scope.actor.name,
      url: `${env().origin}/invitation/${token}`,
      expiresAt: expiresAt.toISOString(),
    },
  });
  return { id };
}

export async function revokeInvitation(
  scope: StudyScope<'people:invite'>,
  { params }: { params: { id: string } },
  context: CommandContext,
): Promise<{ id: string }> {
  const invitation = await context.em.findOne(Invitation, {
    organisationId: scope.organisationId,
    studyId: scope.studyId,
    id: params.id,
    acceptedAt: null,
  });
  if (!invitation) throw new NotFoundError('There is no open invitation of that kind.');
  if (invitation.revokedAt) return { id: invitation.id };
  invitation.revokedAt = context.clock.now();
  await context.em.flush();
  await recordAudit(context, scope, {
    action: 'people:revoke-invitation',
    recordType: 'invitation',
    recordId: invitation.id,
    changes: [{ field: 'email', old: invitation.email, new: null }],
  });
  return { id: invitation.id };
}

export async function endMembership(
  scope: StudyScope<'people:invite'>,
  { params }: { params: { id: string } },
  context: CommandContext,
): Promise<{ id: string }> {
  const member = await context.em.findOne(StudyMember, {
    organisationId: scope.organisationId,
    studyId: scope.studyId,
    id: params.id,
  });
  if (!member) throw new NotFoundError('There is no such person in this study.');
  if (!mayInvite(scope.role, member.role))
    throw new ForbiddenError(`Only an owner of the organisation ends the access of a ${ROLE_NAMES[member.role]}.`);
  const person = await context.em.findOneOrFail(Person, { id: member.personId });
  context.em.remove(member);
  await context.em.flush();
  await recordAudit(context, scope, {
    action: 'people:end-membership',
    recordType: 'study_member',
    recordId: member.id,
    changes: [
      { field: 'role', old: member.role, new: null },
      { field: 'email', old: person.email, new: null },
    ],
  });
  return { id: member.id };
}

/** An invitation makes the account: its address is verified, since the link was read there. */
export async function acceptInvitation(
  _scope: null,
  { body }: { body: { token: string; name: string; password: string } },
  context: CommandContext,
): Promise<{ email: string }> {
  const { em, clock } = context;
  const invitation = await openInvitation(body.token, context);
  const fault = passwordFault(body.password, { name: body.name, email: invitation.email });
  if (fault) throw new InvalidError([{ pointer: '/password', detail: fault }]);
  const known = await em.execute(`select 1 from person where lower(email) = ?`, [invitation.email]);
  if (known.length > 0)
    throw new ConflictError(
      'There is an account with this address already. Sign in with it, then open the invitation again.',
    );
  const now = clock.now();
  const personId = randomUUID();
  em.persist(
    em.create(Person, {
      id: personId,
      name: body.name,
      email: invitation.email,
      emailVerified: true,
      createdAt: now,
      updatedAt: now,
    }),
  );
  em.persist(
    em.create(Account, {
      id: randomUUID(),
      accountId: personId,
      providerId: 'credential',
      userId: personId,
      password: await hashPassword(body.password),
      createdAt: now,
      updatedAt: now,
    }),
  );
  // Person first: memberships refer to it at once, not at the end of the transaction.
  await em.flush();
  await join(invitation, { personId, name: body.name, email: invitation.email }, context);
  return { email: invitation.email };
}

export async function joinWithAccount(
  scope: PersonScope,
  { body }: { body: { token: string } },
  context: CommandContext,
): Promise<{ email: string }> {
  const invitation = await openInvitation(body.token, context);
  if (scope.actor.email.toLowerCase() !== invitation.email)
    throw new ForbiddenError(
      `This invitation is for another address than ${scope.actor.email}. Sign in with the address that it was sent to.`,
    );
  await join(invitation, scope.actor, context);
  return { email: invitation.email };
}

async function openInvitation(token: string, { em, clock }: CommandContext): Promise<InvitationRow> {
  await setTenancy(em, { invitationHash: hashToken(token) });
  const found = await em.findOne(Invitation, {
    tokenHash: hashToken(token),
    acceptedAt: null,
    revokedAt: null,
    expiresAt: { $gt: clock.now() },
  });
  if (!found) throw new NotFoundError('This invitation has been used, taken back or has expired. Ask for a new one.');
  await setTenancy(em, { organisationId: found.organisationId });
  // Locked, so that two clicks on one link make one account.
  await em.execute(`select 1 from invitation where id = ? for update`, [found.id]);
  await em.refresh(found);
  if (found.acceptedAt) throw new NotFoundError('This invitation has been used.');
  return found;
}

async function join(invitation: InvitationRow, actor: Actor, context: CommandContext): Promise<void> {
  const { em, clock } = context;
  const { organisationId, studyId, siteId, role } = invitation;
  const now = clock.now();
  const key = { id: randomUUID(), organisationId, personId: actor.personId, createdAt: now };
  if (role === 'owner') {
    await em.nativeDelete(OrganisationMember, { organisationId, personId: actor.personId });
    em.persist(em.create(OrganisationMember, { ...key, role: 'owner' }));
  } else {
    const present = await em.findOne(StudyMember, { organisationId, studyId: studyId!, personId: actor.personId });
    if (present) throw new ConflictError(`You already have a role in this study: ${ROLE_NAMES[present.role]}.`);
    em.persist(em.create(StudyMember, { ...key, studyId: studyId!, role, siteId }));
  }
  invitation.acceptedAt = now;
  await em.flush();
  await recordAudit(
    context,
    { actor, role, organisationId, studyId },
    {
      action: 'people:join',
      recordType: role === 'owner' ? 'organisation_member' : 'study_member',
      recordId: key.id,
      changes: [
        { field: 'role', old: null, new: role },
        { field: 'email', old: null, new: actor.email },
      ],
    },
  );
}
