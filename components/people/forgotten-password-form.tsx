'use client';

import { useForm } from 'react-hook-form';
import { authRequest } from '@/components/people/auth-request';
import { Button } from '@/components/ui/button';
import { FormProblem } from '@/components/ui/form-problem';
import { Notice } from '@/components/ui/notice';
import { TextField } from '@/components/ui/text-field';

export function ForgottenPasswordForm() {
  const { register, handleSubmit, setError, formState } = useForm<{ email: string }>();
  const { errors, isSubmitting, isSubmitSuccessful } = formState;
  const send = handleSubmit(async ({ email }) => {
    try {
      await authRequest(
        '/request-password-reset',
        { email, redirectTo: '/reset-password' },
        { 400: 'Give an e-mail address, for example name@company.example.' },
      );
    } catch (error) {
      setError('root', { message: (error as Error).message });
    }
  });
  if (isSubmitSuccessful && !errors.root) {
    return (
      <Notice live title="Look into your mail">
        If the address has an account, a link is on its way to it.
      </Notice>
    );
  }
  return (
    <form onSubmit={send} method="post" noValidate className="max-w-[22rem] space-y-5">
      <FormProblem title="Not sent" message={errors.root?.message} />
      <TextField
        label="E-mail"
        type="email"
        autoComplete="username"
        error={errors.email?.message}
        {...register('email', { required: 'Give your e-mail address.' })}
      />
      <Button type="submit" pending={isSubmitting} pendingLabel="Sending">
        Send me a link
      </Button>
    </form>
  );
}
