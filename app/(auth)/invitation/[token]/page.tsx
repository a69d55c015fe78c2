import type { Metadata } from 'next';
import { headers } from 'next/headers';
import { AcceptInvitationForm } from '@/components/people/accept-invitation-form';
import { JoinForm } from '@/components/people/join-form';
import { EmptyState } from '@/components/ui/empty-state';
import { PageHead } from '@/components/ui/page-head';
import { findActor } from '@/lib/auth/actor';
import { systemClock } from '@/lib/clock';
import { transact } from '@/lib/db/transaction';
import { findInvitation } from '@/lib/people/queries';

export const metadata: Metadata = { title: 'Invitation', referrer: 'no-referrer' };

export default async function InvitationPage({ params }: { params: Promise<{ token: string }> }) {
  const { token } = await params;
  const invitation = await transact({}, (em) => findInvitation(token, em, systemClock.now()));
  if (!invitation) {
    return (
      <EmptyState heading title="This invitation does not work any more">
        <p>It has been used, taken back or is older than a week. Ask the person who sent it for a new one.</p>
      </EmptyState>
    );
  }
  const actor = await findActor(new Headers(await headers()));
  return (
    <>
      <PageHead
        path={[{ label: invitation.organisationName }]}
        title={invitation.studyTitle ?? invitation.organisationName}
        lead={`You are invited as ${invitation.roleName}, with the address ${invitation.email}.`}
      />
      {invitation.hasAccount ? (
        <JoinForm token={token} email={invitation.email} signedInAs={actor?.email ?? null} />
      ) : (
        <AcceptInvitationForm token={token} name={invitation.name} email={invitation.email} />
      )}
    </>
  );
}
