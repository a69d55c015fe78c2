'use client';

import { useState } from 'react';
import { toast } from 'sonner';
import { InviteForm } from '@/components/people/invite-form';
import { Button } from '@/components/ui/button';
import { ConfirmDialog } from '@/components/ui/confirm-dialog';
import { Disclosure } from '@/components/ui/disclosure';
import { EmptyState } from '@/components/ui/empty-state';
import { Section } from '@/components/ui/section';
import { Cell, HeadCell, Row, RowHead, SubLine, Table, TableBody, TableHead } from '@/components/ui/table';
import { ROLE_NAMES, type StudyRole } from '@/lib/auth/permissions';
import { formatDate } from '@/lib/format';
import { useEndMembership, usePeople, useRevokeInvitation } from '@/lib/people/hooks';
import type { Member, PendingInvitation, People } from '@/lib/people/schema';

interface Props {
  code: string;
  people: People;
  /** The roles that the reader may invite; none: the page only shows. */
  invitable: StudyRole[];
  sites: { code: string; name: string }[];
  sentences: { role: StudyRole; may: string[] }[];
}

export function PeopleBoard({ code, people, invitable, sites, sentences }: Props) {
  const { members, invitations } = usePeople(code, people).data;
  const revoke = useRevokeInvitation(code);
  const end = useEndMembership(code);
  const [leaving, setLeaving] = useState<Member | null>(null);
  const fail = (error: Error): void => void toast.error(error.message);
  return (
    <>
      <MembersTable members={members} mayEnd={(role) => invitable.includes(role)} onEnd={setLeaving} />
      <Section title="Invited" aside="An invitation works once, within a week">
        <InvitationsTable
          invitations={invitations}
          mayRevoke={(role) => role !== 'owner' && invitable.includes(role)}
          onRevoke={(id) =>
            revoke.mutate(id, { onError: fail, onSuccess: () => toast.success('The invitation is taken back.') })
          }
        />
      </Section>
      {invitable.length > 0 && (
        <Section title="Invite a person">
          <InviteForm code={code} roles={invitable} sites={sites} />
        </Section>
      )}
      <Section title="What each role may do">
        {sentences.map(({ role, may }) => (
          <Disclosure key={role} title={`A ${ROLE_NAMES[role]} may`} className="mb-3">
            <ul className="list-disc pl-5">
              {may.map((sentence) => (
                <li key={sentence}>{sentence}</li>
              ))}
            </ul>
          </Disclosure>
        ))}
      </Section>
      <ConfirmDialog
        open={leaving !== null}
        onOpenChange={(open) => !open && setLeaving(null)}
        title={`End ${leaving?.name ?? ''}’s access?`}
        description="It ends with their next click. What they entered stays, under their name."
        verb="End access"
        danger
        pending={end.isPending}
        onConfirm={() =>
          leaving &&
          end.mutate(leaving.id, {
            onError: fail,
            onSuccess: () => toast.success(`${leaving.name}’s access has ended.`),
            onSettled: () => setLeaving(null),
          })
        }
      />
    </>
  );
}

function MembersTable({
  members,
  mayEnd,
  onEnd,
}: {
  members: Member[];
  mayEnd: (role: StudyRole) => boolean;
  onEnd: (member: Member) => void;
}) {
  if (members.length === 0)
    return (
      <EmptyState title="Nobody has a role yet">
        Invite the protocol statistician first: they set up the plan.
      </EmptyState>
    );
  return (
    <Table caption="People with a role in the study">
      <TableHead>
        <Row>
          <HeadCell>Person</HeadCell>
          <HeadCell>Role</HeadCell>
          <HeadCell>Since</HeadCell>
          <HeadCell>
            <span className="sr-only">Act</span>
          </HeadCell>
        </Row>
      </TableHead>
      <TableBody>
        {members.map((member) => (
          <Row key={member.id}>
            <RowHead>
              {member.name}
              <SubLine>{member.email}</SubLine>
            </RowHead>
            <Cell>
              {ROLE_NAMES[member.role]}
              {member.siteCode && <SubLine>site {member.siteCode}</SubLine>}
            </Cell>
            <Cell>{formatDate(member.since.slice(0, 10))}</Cell>
            <Cell className="text-right">
              {mayEnd(member.role) && (
                <Button variant="quiet" size="small" onClick={() => onEnd(member)}>
                  End access
                </Button>
              )}
            </Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}

function InvitationsTable({
  invitations,
  mayRevoke,
  onRevoke,
}: {
  invitations: PendingInvitation[];
  mayRevoke: (role: PendingInvitation['role']) => boolean;
  onRevoke: (id: string) => void;
}) {
  if (invitations.length === 0) return <p className="text-ink-soft">No invitation is open.</p>;
  return (
    <Table caption="Open invitations">
      <TableHead>
        <Row>
          <HeadCell>Invited</HeadCell>
          <HeadCell>As</HeadCell>
          <HeadCell>Until</HeadCell>
          <HeadCell>
            <span className="sr-only">Act</span>
          </HeadCell>
        </Row>
      </TableHead>
      <TableBody>
        {invitations.map((invitation) => (
          <Row key={invitation.id}>
            <RowHead>
              {invitation.name}
              <SubLine>{invitation.email}</SubLine>
            </RowHead>
            <Cell>
              {ROLE_NAMES[invitation.role]}
              {invitation.siteCode && <SubLine>site {invitation.siteCode}</SubLine>}
            </Cell>
            <Cell className={invitation.isExpired ? 'text-caution' : undefined}>
              {invitation.isExpired ? 'expired ' : ''}
              {formatDate(invitation.expiresAt.slice(0, 10))}
            </Cell>
            <Cell className="text-right">
              {mayRevoke(invitation.role) && (
                <Button variant="quiet" size="small" onClick={() => onRevoke(invitation.id)}>
                  Take back
                </Button>
              )}
            </Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}
