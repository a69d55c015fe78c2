import type { Metadata } from 'next';
import { ForgottenPasswordForm } from '@/components/people/forgotten-password-form';
import { PageHead } from '@/components/ui/page-head';

export const metadata: Metadata = { title: 'Forgotten password' };

export default function ForgottenPasswordPage() {
  return (
    <>
      <PageHead
        title="Forgotten password"
        lead="A link to choose a new one comes by e-mail. It works once, within an hour."
      />
      <ForgottenPasswordForm />
    </>
  );
}
