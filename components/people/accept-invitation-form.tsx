'use client';

import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import { signIn } from '@/components/people/sign-in-form';
import { leaveTo } from '@/components/people/leave-to';
import { Button } from '@/components/ui/button';
import { FormProblem } from '@/components/ui/form-problem';
import { TextField } from '@/components/ui/text-field';
import { callOperation, ProblemError } from '@/lib/http/client';
import { acceptInvitationOperation } from '@/lib/people/operations';
import { acceptInvitationBody } from '@/lib/people/schema';

interface Props {
  token: string;
  name: string;
  email: string;
}

export function AcceptInvitationForm({ token, name, email }: Props) {
  const form = useForm({ resolver: zodResolver(acceptInvitationBody), defaultValues: { token, name, password: '' } });
  const { errors, isSubmitting, isSubmitSuccessful } = form.formState;
  const save = form.handleSubmit(async (body) => {
    try {
      await callOperation(acceptInvitationOperation, { params: {}, body });
      await signIn({ email, password: body.password });
      leaveTo('/studies');
    } catch (error) {
      const password = error instanceof ProblemError ? error.fault('/password') : undefined;
      if (password) form.setError('password', { message: password });
      else form.setError('root', { message: (error as Error).message });
    }
  });
  return (
    <form onSubmit={save} method="post" noValidate className="max-w-[22rem] space-y-5">
      <FormProblem title="Not saved" message={errors.root?.message} />
      <TextField
        label="Your name, as others will see it"
        autoComplete="name"
        error={errors.name?.message}
        {...form.register('name')}
      />
      <TextField
        label="Password"
        type="password"
        autoComplete="new-password"
        hint="At least 12 characters; a few words in a row are fine."
        error={errors.password?.message}
        {...form.register('password')}
      />
      <Button
        type="submit"
        pending={isSubmitting || (isSubmitSuccessful && !errors.root && !errors.password)}
        pendingLabel="Making your account"
      >
        Accept and sign in
      </Button>
    </form>
  );
}
