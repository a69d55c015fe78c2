import { headers } from 'next/headers';
import { Landing } from '@/components/landing/landing';
import { SignInForm } from '@/components/people/sign-in-form';
import { ButtonLink } from '@/components/ui/button-link';
import { findActor } from '@/lib/auth/actor';
import { safeNextPath } from '@/lib/auth/next-path';

export default async function FirstPage() {
  const next = safeNextPath(null);
  const actor = await findActor(new Headers(await headers()));
  return (
    <Landing
      signIn={
        actor ? (
          <div className="space-y-3">
            <p>You are signed in.</p>
            <ButtonLink href={next}>Open your studies</ButtonLink>
          </div>
        ) : (
          <SignInForm next={next} />
        )
      }
    />
  );
}
