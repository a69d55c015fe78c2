import type { Metadata } from 'next';
import Link from 'next/link';
import { ResetPasswordForm } from '@/components/people/reset-password-form';
import { EmptyState } from '@/components/ui/empty-state';
import { PageHead } from '@/components/ui/page-head';

export const metadata: Metadata = { title: 'New password', referrer: 'no-referrer' };

export default async function ResetPasswordPage({
  searchParams,
}: {
  searchParams: Promise<{ token?: string; error?: string }>;
}) {
  const { token, error } = await searchParams;
  if (!token || error) {
    return (
      <EmptyState
        heading
        title="This link does not work any more"
        action={<Link href="/forgotten-password">Ask for a new one</Link>}
      >
        <p>It has been used, or it is older than an hour.</p>
      </EmptyState>
    );
  }
  return (
    <>
      <PageHead title="New password" lead="Saving it signs you out everywhere else." />
      <ResetPasswordForm token={token} />
    </>
  );
}
