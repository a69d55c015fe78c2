import type { EntityManager } from '@mikro-orm/postgresql';
import type { CommandContext } from '../audit/record';
import { ROLE_NAMES, type StudyRole } from '../auth/permissions';
import type { OrganisationScope, StudyScope } from '../auth/scope';
import { setTenancy } from '../db/transaction';
import { hashToken } from './rules';
import type { InvitationView, People } from './schema';

interface MemberRow {
  id: string;
  name: string;
  email: string;
  role: StudyRole;
  site_code: string | null;
  since: Date;
}

interface InvitationRow {
  id: string;
  name: string;
  email: string;
  role: StudyRole | 'owner';
  site_code: string | null;
  expires_at: Date;
}

/** At most a thousand of each: a study's team, not a directory. */
const MOST = 1000;

export async function listPeople(
  scope: StudyScope<'people:read'>,
  _input: unknown,
  { em, clock }: Pick<CommandContext, 'em' | 'clock'>,
): Promise<People> {
  const members = await em.execute<MemberRow[]>(
    `select m.id, p.name, p.email, m.role, s.code as site_code, m.created_at as since
       from study_member m join person p on p.id = m.person_id left join site s on s.organisation_id = m.organisation_id and s.id = m.site_id
      where m.organisation_id = ? and m.study_id = ? order by array_position(array['statistician', 'manager', 'coordinator', 'sponsor'], m.role), s.code, p.name limit ${MOST}`,
    [scope.organisationId, scope.studyId],
  );
  const invitations = await em.execute<InvitationRow[]>(
    `select i.id, i.name, i.email, i.role, s.code as site_code, i.expires_at
       from invitation i left join site s on s.organisation_id = i.organisation_id and s.id = i.site_id
      where i.organisation_id = ? and i.study_id = ? and i.accepted_at is null and i.revoked_at is null order by i.created_at desc limit ${MOST}`,
    [scope.organisationId, scope.studyId],
  );
  const now = clock.now();
  return {
    members: members.map((row) => ({
      id: row.id,
      name: row.name,
      email: row.email,
      role: row.role,
      siteCode: row.site_code,
      since: new Date(row.since).toISOString(),
    })),
    invitations: invitations.map((row) => ({
      id: row.id,
      name: row.name,
      email: row.email,
      role: row.role,
      siteCode: row.site_code,
      expiresAt: new Date(row.expires_at).toISOString(),
      isExpired: new Date(row.expires_at) <= now,
    })),
  };
}

export interface OrganisationPeople {
  owners: { name: string; email: string }[];
  studies: { code: string; title: string; sponsorName: string; people: number }[];
}

export async function listOrganisation(
  scope: OrganisationScope<'organisation:read'>,
  em: EntityManager,
): Promise<OrganisationPeople> {
  const owners = await em.execute<{ name: string; email: string }[]>(
    `select p.name, p.email from organisation_member w join person p on p.id = w.person_id where w.organisation_id = ? and w.role = 'owner' order by p.name limit ${MOST}`,
    [scope.organisationId],
  );
  const studies = await em.execute<{ code: string; title: string; sponsor_name: string; people: number }[]>(
    `select s.code, s.title, s.sponsor_name, (select count(*)::int from study_member m where m.organisation_id = s.organisation_id and m.study_id = s.id) as people
       from study s where s.organisation_id = ? order by s.code limit ${MOST}`,
    [scope.organisationId],
  );
  return {
    owners,
    studies: studies.map((row) => ({
      code: row.code,
      title: row.title,
      sponsorName: row.sponsor_name,
      people: row.people,
    })),
  };
}

/** What an invitation's link shows; null where it is used, revoked, expired or never was: the four look alike. */
export async function findInvitation(token: string, em: EntityManager, now: Date): Promise<InvitationView | null> {
  await setTenancy(em, { invitationHash: hashToken(token) });
  const [invitation] = await em.execute<
    { organisation_id: string; study_id: string | null; role: StudyRole | 'owner'; name: string; email: string }[]
  >(
    `select organisation_id, study_id, role, name, email from invitation where token_hash = ? and accepted_at is null and revoked_at is null and expires_at > ?`,
    [hashToken(token), now],
  );
  if (!invitation) return null;
  await setTenancy(em, { organisationId: invitation.organisation_id });
  const [organisation] = await em.execute<{ name: string }[]>(`select name from organisation where id = ?`, [
    invitation.organisation_id,
  ]);
  const [study] = invitation.study_id
    ? await em.execute<{ title: string }[]>(`select title from study where organisation_id = ? and id = ?`, [
        invitation.organisation_id,
        invitation.study_id,
      ])
    : [];
  const [account] = await em.execute<{ id: string }[]>(`select id from person where lower(email) = ?`, [
    invitation.email,
  ]);
  return {
    organisationName: organisation!.name,
    studyTitle: study?.title ?? null,
    roleName: ROLE_NAMES[invitation.role],
    name: invitation.name,
    email: invitation.email,
    hasAccount: account !== undefined,
  };
}

/** Sites that a coordinator can be invited for. */
export async function listInvitableSites(
  scope: StudyScope<'people:read'>,
  em: EntityManager,
): Promise<{ code: string; name: string }[]> {
  return em.execute<{ code: string; name: string }[]>(
    `select code, name from site where organisation_id = ? and study_id = ? and closed_on is null order by code limit 5000`,
    [scope.organisationId, scope.studyId],
  );
}
