'use client';

import { zodResolver } from '@hookform/resolvers/zod';
import { useForm } from 'react-hook-form';
import { toast } from 'sonner';
import { Button } from '@/components/ui/button';
import { TextField } from '@/components/ui/text-field';
import { useInviteOwner } from '@/lib/people/hooks';
import { inviteOwnerBody } from '@/lib/people/schema';

export function InviteOwnerForm() {
  const form = useForm({ resolver: zodResolver(inviteOwnerBody), defaultValues: { name: '', email: '' } });
  const { errors } = form.formState;
  const invite = useInviteOwner();
  const send = form.handleSubmit(async (body) => {
    try {
      await invite.mutateAsync(body);
      toast.success(`An invitation is on its way to ${body.email}.`);
      form.reset();
    } catch (error) {
      form.setError('email', { message: (error as Error).message });
    }
  });
  return (
    <form onSubmit={send} noValidate className="grid max-w-measure gap-5 sm:grid-cols-[1fr_1fr_auto] sm:items-end">
      <TextField label="Name" autoComplete="off" error={errors.name?.message} {...form.register('name')} />
      <TextField
        label="E-mail"
        type="email"
        autoComplete="off"
        error={errors.email?.message}
        {...form.register('email')}
      />
      <Button type="submit" variant="second" pending={invite.isPending} pendingLabel="Sending">
        Invite an owner
      </Button>
    </form>
  );
}
