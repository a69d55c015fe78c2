import type { Metadata } from 'next';
import { headers } from 'next/headers';
import { redirect } from 'next/navigation';
import { SignInForm } from '@/components/people/sign-in-form';
import { PageHead } from '@/components/ui/page-head';
import { findActor } from '@/lib/auth/actor';
import { safeNextPath } from '@/lib/auth/next-path';

export const metadata: Metadata = { title: 'Sign in' };

export default async function SignInPage({ searchParams }: { searchParams: Promise<{ next?: string }> }) {
  const next = safeNextPath((await searchParams).next);
  if (await findActor(new Headers(await headers()))) redirect(next);
  return (
    <>
      <PageHead title="Sign in" lead="Accounts are by invitation." />
      <SignInForm next={next} />
    </>
  );
}
