import type { Metadata } from 'next';
import Link from 'next/link';
import { InviteOwnerForm } from '@/components/people/invite-owner-form';
import { NoPermission } from '@/components/shell/no-permission';
import { PageFrame } from '@/components/shell/page-frame';
import { CreateStudyForm } from '@/components/studies/create-study-form';
import { EmptyState } from '@/components/ui/empty-state';
import { PageHead } from '@/components/ui/page-head';
import { Section } from '@/components/ui/section';
import { Cell, HeadCell, Row, RowHead, SubLine, Table, TableBody, TableHead } from '@/components/ui/table';
import { formatQuantity } from '@/lib/format';
import { readOrganisation } from '@/lib/http/page';
import { listOrganisation } from '@/lib/people/queries';

export const metadata: Metadata = { title: 'Organisation' };

export default async function OrganisationPage() {
  const read = await readOrganisation('organisation:read', async (scope, em) => ({
    name: scope.organisationName,
    ...(await listOrganisation(scope, em)),
  }));
  if (!read.permitted) {
    return (
      <PageFrame forecast={false}>
        <NoPermission detail={read.detail} />
      </PageFrame>
    );
  }
  const { name, owners, studies } = read.data;
  return (
    <PageFrame forecast={false}>
      <PageHead
        title={name}
        lead={`${formatQuantity(studies.length, 'study', 'studies')}, ${formatQuantity(owners.length, 'owner')}. An owner sets up studies and people; what a study holds is seen by those with a role in it.`}
      />
      <Section title="Studies">
        {studies.length === 0 ? (
          <EmptyState title="No study yet">Set one up below, then invite its protocol statistician.</EmptyState>
        ) : (
          <Table caption="Studies of the organisation">
            <TableHead>
              <Row>
                <HeadCell>Study</HeadCell>
                <HeadCell>Sponsor</HeadCell>
                <HeadCell num>People</HeadCell>
                <HeadCell>Open</HeadCell>
              </Row>
            </TableHead>
            <TableBody>
              {studies.map((study) => (
                <Row key={study.code}>
                  <RowHead>
                    {study.code}
                    <SubLine>{study.title}</SubLine>
                  </RowHead>
                  <Cell>{study.sponsorName}</Cell>
                  <Cell num>{study.people}</Cell>
                  <Cell>
                    <Link href={`/studies/${study.code}/people`}>People</Link> ·{' '}
                    <Link href={`/studies/${study.code}/audit`}>Audit</Link>
                  </Cell>
                </Row>
              ))}
            </TableBody>
          </Table>
        )}
      </Section>
      <Section title="Set up a study" id="set-up">
        <CreateStudyForm />
      </Section>
      <Section title="Owners">
        <ul className="mb-5">
          {owners.map((owner) => (
            <li key={owner.email}>
              {owner.name} <span className="text-ink-soft">{owner.email}</span>
            </li>
          ))}
        </ul>
        <InviteOwnerForm />
      </Section>
    </PageFrame>
  );
}
