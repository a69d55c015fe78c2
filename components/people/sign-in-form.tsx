'use client';

import Link from 'next/link';
import { useForm } from 'react-hook-form';
import { authRequest } from '@/components/people/auth-request';
import { leaveTo } from '@/components/people/leave-to';
import { Button } from '@/components/ui/button';
import { FormProblem } from '@/components/ui/form-problem';
import { TextField } from '@/components/ui/text-field';

interface Credentials {
  email: string;
  password: string;
}

export async function signIn(credentials: Credentials): Promise<void> {
  // One sentence for a wrong password and for an unknown address: neither is given away.
  const refused = 'The address and the password do not belong together. Check both, or ask for a new password.';
  await authRequest('/sign-in/email', credentials, { 400: refused, 401: refused, 403: refused });
}

export function SignInForm({ next }: { next: string }) {
  const { register, handleSubmit, setError, formState } = useForm<Credentials>();
  const { errors, isSubmitting, isSubmitSuccessful } = formState;
  const send = handleSubmit(async (credentials) => {
    try {
      await signIn(credentials);
      leaveTo(next);
    } catch (error) {
      setError('root', { message: (error as Error).message });
    }
  });
  return (
    <form onSubmit={send} method="post" noValidate className="max-w-[22rem] space-y-5">
      <FormProblem title="Not signed in" message={errors.root?.message} />
      <TextField
        label="E-mail"
        type="email"
        autoComplete="username"
        error={errors.email?.message}
        {...register('email', { required: 'Give your e-mail address.' })}
      />
      <TextField
        label="Password"
        type="password"
        autoComplete="current-password"
        error={errors.password?.message}
        {...register('password', { required: 'Give your password.' })}
      />
      <div className="flex flex-wrap items-center gap-5">
        <Button type="submit" pending={isSubmitting || (isSubmitSuccessful && !errors.root)} pendingLabel="Signing in">
          Sign in
        </Button>
        <Link href="/forgotten-password" className="text-13">
          Forgotten password
        </Link>
      </div>
    </form>
  );
}
