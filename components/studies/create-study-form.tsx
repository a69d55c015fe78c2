'use client';

import { zodResolver } from '@hookform/resolvers/zod';
import { useRouter } from 'next/navigation';
import { useForm } from 'react-hook-form';
import { Button } from '@/components/ui/button';
import { FormProblem } from '@/components/ui/form-problem';
import { TextField } from '@/components/ui/text-field';
import { sayDone } from '@/components/ui/toaster';
import { ProblemError } from '@/lib/http/client';
import { useCreateStudy } from '@/lib/studies/hooks';
import { type CreateStudyBody, createStudyBody } from '@/lib/studies/schema';

/** An owner gives a study its name; the people whom they invite fill it. */
export function CreateStudyForm() {
  const router = useRouter();
  const create = useCreateStudy();
  const form = useForm({
    resolver: zodResolver(createStudyBody),
    defaultValues: { code: '', title: '', sponsorName: '' },
  });
  const { errors } = form.formState;
  const refuse = (error: Error): void => {
    const problem = error instanceof ProblemError ? error.problem : null;
    if (problem?.status === 409) return form.setError('code', { message: problem.detail }, { shouldFocus: true });
    for (const fault of problem?.errors ?? [])
      form.setError(fault.pointer.slice(1) as keyof CreateStudyBody, { message: fault.detail });
    if (!problem?.errors) form.setError('root', { message: error.message });
  };
  const save = form.handleSubmit(async (body) => {
    try {
      const study = await create.mutateAsync(body);
      sayDone(`${study.code} is set up. Invite its protocol statistician next.`);
      router.push(`/studies/${encodeURIComponent(study.code)}/people`);
      router.refresh();
    } catch (error) {
      refuse(error as Error);
    }
  });
  return (
    <form onSubmit={save} noValidate className="max-w-measure space-y-5">
      <FormProblem title="Not set up" message={errors.root?.message} />
      <div className="grid gap-5 sm:grid-cols-2">
        <TextField
          label="Code"
          hint="As the sponsor writes it, for example KLD-301. It stays."
          autoComplete="off"
          error={errors.code?.message}
          {...form.register('code')}
        />
        <TextField
          label="Sponsor"
          autoComplete="off"
          error={errors.sponsorName?.message}
          {...form.register('sponsorName')}
        />
        <TextField
          label="Title"
          fieldClassName="sm:col-span-2"
          hint="What is studied in whom, without treatment arms."
          autoComplete="off"
          error={errors.title?.message}
          {...form.register('title')}
        />
      </div>
      <Button type="submit" pending={create.isPending} pendingLabel="Setting up">
        Set up the study
      </Button>
    </form>
  );
}
