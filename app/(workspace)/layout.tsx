import type { ReactNode } from 'react';
import { SignOutButton } from '@/components/people/sign-out-button';
import { QueryProvider } from '@/components/shell/query-provider';
import { RunningHead } from '@/components/shell/running-head';
import { transact } from '@/lib/db/transaction';
import { pageActor } from '@/lib/http/page';
import { getPersonHead } from '@/lib/portfolio/queries';

/** Every signed-in page: on whose behalf one is here, the ways on, and one query cache. */
export default async function WorkspaceLayout({ children }: { children: ReactNode }) {
  const actor = await pageActor();
  const head = await transact({ personId: actor.personId }, (em) => getPersonHead({ actor }, em));
  const links = [
    ...(head.hasList ? [{ label: 'Studies', href: '/studies' }] : []),
    ...(head.isOwner ? [{ label: 'Organisation', href: '/organisation' }] : []),
    { label: 'Help', href: '/method' },
  ];
  return (
    <QueryProvider>
      <RunningHead
        homeHref="/studies"
        organisation={head.behalf ?? undefined}
        links={links}
        person={{ name: actor.name, role: head.role }}
        signOut={<SignOutButton />}
      />
      {children}
    </QueryProvider>
  );
}
