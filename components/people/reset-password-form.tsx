'use client';

import { zodResolver } from '@hookform/resolvers/zod';
import Link from 'next/link';
import { useForm } from 'react-hook-form';
import { z } from 'zod';
import { authRequest } from '@/components/people/auth-request';
import { Button } from '@/components/ui/button';
import { FormProblem } from '@/components/ui/form-problem';
import { Notice } from '@/components/ui/notice';
import { TextField } from '@/components/ui/text-field';
import { password } from '@/lib/people/schema';

const schema = z.strictObject({ newPassword: password });

export function ResetPasswordForm({ token }: { token: string }) {
  const { register, handleSubmit, setError, formState } = useForm({
    resolver: zodResolver(schema),
    defaultValues: { newPassword: '' },
  });
  const { errors, isSubmitting, isSubmitSuccessful } = formState;
  const save = handleSubmit(async ({ newPassword }) => {
    try {
      await authRequest(
        '/reset-password',
        { token, newPassword },
        { 400: 'This link has been used or is too old, or the password is too easy to guess.' },
      );
    } catch (error) {
      setError('root', { message: (error as Error).message });
    }
  });
  if (isSubmitSuccessful && !errors.root) {
    return (
      <Notice live title="The new password is saved">
        <Link href="/sign-in">Sign in with it</Link>
      </Notice>
    );
  }
  return (
    <form onSubmit={save} method="post" noValidate className="max-w-[22rem] space-y-5">
      <FormProblem title="Not saved" message={errors.root?.message} />
      <TextField
        label="New password"
        type="password"
        autoComplete="new-password"
        hint="At least 12 characters."
        error={errors.newPassword?.message}
        {...register('newPassword')}
      />
      <Button type="submit" pending={isSubmitting} pendingLabel="Saving">
        Save the new password
      </Button>
    </form>
  );
}
