import type { EntityManager } from '@mikro-orm/postgresql';
import { setTenancy } from '../db/transaction';
import { ForbiddenError, NotFoundError } from '../errors';
import { type ActingRole, type OrganisationAction, roleMay, type StudyAction, STUDY_PERMISSIONS } from './permissions';
import type { Actor, OrganisationScope, StudyScope } from './scope';

interface FoundStudy {
  organisation_id: string;
  organisation_name: string;
  is_demonstration: boolean;
  study_id: string;
  code: string;
  role: ActingRole;
  site_id: string | null;
}

/**
 * The only maker of a study scope. Finds the study among those the person has a role in (or owns the organisation of),
 * checks the permission, and tells the open transaction which organisation it works for.
 *
 * Two organisations may use one study code; a person in both gets the study of the organisation that they joined first.
 */
export async function authoriseStudy<A extends StudyAction>(
  em: EntityManager,
  actor: Actor,
  studyCode: string,
  action: A,
): Promise<StudyScope<A>> {
  await setTenancy(em, { personId: actor.personId });
  const [found] = await em.execute<FoundStudy[]>(
    `select o.id as organisation_id, o.name as organisation_name, o.is_demonstration, s.id as study_id, s.code, coalesce(m.role, 'owner') as role, m.site_id
       from study s
       join organisation o on o.id = s.organisation_id
       left join study_member m on m.organisation_id = s.organisation_id and m.study_id = s.id and m.person_id = ?
       left join organisation_member w on w.organisation_id = s.organisation_id and w.person_id = ? and w.role = 'owner'
      where s.code = ? and (m.id is not null or w.id is not null)
      order by coalesce(m.created_at, w.created_at) limit 1`,
    [actor.personId, actor.personId, studyCode],
  );
  if (!found) throw new NotFoundError(`There is no study ${studyCode} that you have a role in.`);
  const allowed = roleMay(found.role, action) || (await ownerMay(em, actor, found, action));
  if (!allowed) throw new ForbiddenError(`Your role in ${found.code} may not ${STUDY_PERMISSIONS[action].sentence}.`);
  await setTenancy(em, { organisationId: found.organisation_id, personId: actor.personId });
  return {
    action,
    actor,
    role: roleMay(found.role, action) ? found.role : 'owner',
    organisationId: found.organisation_id,
    organisationName: found.organisation_name,
    isDemonstration: found.is_demonstration,
    studyId: found.study_id,
    studyCode: found.code,
    siteId: found.role === 'coordinator' ? found.site_id : null,
  } as StudyScope<A>;
}

/** An owner who also has a study role keeps what owners may do. */
async function ownerMay(em: EntityManager, actor: Actor, found: FoundStudy, action: StudyAction): Promise<boolean> {
  if (found.role === 'owner' || !roleMay('owner', action)) return false;
  const rows = await em.execute(
    `select 1 from organisation_member where organisation_id = ? and person_id = ? and role = 'owner'`,
    [found.organisation_id, actor.personId],
  );
  return rows.length > 0;
}

/** The only maker of an organisation scope: the person has to own the organisation. */
export async function authoriseOrganisation<A extends OrganisationAction>(
  em: EntityManager,
  actor: Actor,
  action: A,
): Promise<OrganisationScope<A>> {
  await setTenancy(em, { personId: actor.personId });
  const [found] = await em.execute<{ id: string; name: string }[]>(
    `select o.id, o.name from organisation o join organisation_member w on w.organisation_id = o.id
      where w.person_id = ? and w.role = 'owner' order by w.created_at limit 1`,
    [actor.personId],
  );
  if (!found) throw new ForbiddenError('Only an owner of the organisation may open this.');
  await setTenancy(em, { organisationId: found.id, personId: actor.personId });
  return {
    action,
    actor,
    role: 'owner',
    organisationId: found.id,
    organisationName: found.name,
  } as OrganisationScope<A>;
}
