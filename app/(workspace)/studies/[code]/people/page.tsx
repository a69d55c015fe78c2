import type { Metadata } from 'next';
import { NoPermission } from '@/components/shell/no-permission';
import { PeopleBoard } from '@/components/people/people-board';
import { PageHead } from '@/components/ui/page-head';
import { STUDY_PERMISSIONS, STUDY_ROLES } from '@/lib/auth/permissions';
import { systemClock } from '@/lib/clock';
import { formatQuantity } from '@/lib/format';
import { readStudy } from '@/lib/http/page';
import { listInvitableSites, listPeople } from '@/lib/people/queries';
import { mayInvite } from '@/lib/people/rules';

export const metadata: Metadata = { title: 'People' };

export default async function PeoplePage({ params }: { params: Promise<{ code: string }> }) {
  const { code } = await params;
  const read = await readStudy(code, 'people:read', async (scope, em) => ({
    role: scope.role,
    people: await listPeople(scope, null, { em, clock: systemClock }),
    sites: await listInvitableSites(scope, em),
  }));
  if (!read.permitted) return <NoPermission detail={read.detail} code={code} />;
  const { role, people, sites } = read.data;
  const invitable = STUDY_ROLES.filter((invited) => mayInvite(role, invited));
  const sentences = STUDY_ROLES.map((study) => ({
    role: study,
    may: Object.values(STUDY_PERMISSIONS)
      .filter((permission) => (permission.roles as readonly string[]).includes(study))
      .map((permission) => permission.sentence),
  }));
  return (
    <>
      <PageHead
        path={[{ label: code, href: `/studies/${code}` }, { label: 'People' }]}
        title="People"
        lead={`${formatQuantity(people.members.length, 'person has', 'people have')} a role in the study. One role each.`}
      />
      <PeopleBoard code={code} people={people} invitable={invitable} sites={sites} sentences={sentences} />
    </>
  );
}
