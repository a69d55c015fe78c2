'use client';

import { zodResolver } from '@hookform/resolvers/zod';
import { useForm, useWatch } from 'react-hook-form';
import { toast } from 'sonner';
import { Button } from '@/components/ui/button';
import { FormProblem } from '@/components/ui/form-problem';
import { SelectField } from '@/components/ui/select-field';
import { TextField } from '@/components/ui/text-field';
import { ROLE_NAMES, type StudyRole } from '@/lib/auth/permissions';
import { ProblemError } from '@/lib/http/client';
import { useInvitePerson } from '@/lib/people/hooks';
import { type InvitePersonBody, invitePersonBody } from '@/lib/people/schema';

interface Props {
  code: string;
  roles: StudyRole[];
  sites: { code: string; name: string }[];
}

interface Typed {
  name: string;
  email: string;
  role: StudyRole;
  siteCode?: string | undefined;
}

export function InviteForm({ code, roles, sites }: Props) {
  const empty: Typed = { name: '', email: '', role: roles[0]!, siteCode: undefined };
  const form = useForm<Typed, unknown, InvitePersonBody>({
    resolver: zodResolver(invitePersonBody),
    defaultValues: empty,
  });
  const { errors } = form.formState;
  const role = useWatch({ control: form.control, name: 'role' });
  const invite = useInvitePerson(code);
  const send = form.handleSubmit(async (body) => {
    try {
      await invite.mutateAsync(body);
      toast.success(`An invitation is on its way to ${body.email}.`);
      form.reset(empty);
    } catch (error) {
      const faults = error instanceof ProblemError ? (error.problem.errors ?? []) : [];
      for (const fault of faults) form.setError(fault.pointer.slice(1) as keyof Typed, { message: fault.detail });
      if (faults.length === 0) form.setError('root', { message: (error as Error).message });
    }
  });
  return (
    <form onSubmit={send} noValidate className="max-w-measure space-y-5">
      <FormProblem title="Not sent" message={errors.root?.message} />
      <div className="grid gap-5 sm:grid-cols-2">
        <TextField label="Name" autoComplete="off" error={errors.name?.message} {...form.register('name')} />
        <TextField
          label="E-mail"
          type="email"
          autoComplete="off"
          error={errors.email?.message}
          {...form.register('email')}
        />
        <SelectField
          label="Role"
          options={roles.map((value) => ({ value, label: ROLE_NAMES[value] }))}
          error={errors.role?.message}
          {...form.register('role')}
        />
        {role === 'coordinator' && (
          <SelectField
            label="Site"
            options={[
              { value: '', label: sites.length > 0 ? 'Choose a site' : 'No site yet: add one first' },
              ...sites.map((site) => ({ value: site.code, label: `${site.code} ${site.name}` })),
            ]}
            error={errors.siteCode?.message}
            {...form.register('siteCode', {
              setValueAs: (value: string) => value || undefined,
              shouldUnregister: true,
            })}
          />
        )}
      </div>
      <Button type="submit" pending={invite.isPending} pendingLabel="Sending">
        Send the invitation
      </Button>
    </form>
  );
}
