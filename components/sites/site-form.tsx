'use client';

import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { toast } from 'sonner';
import { SiteConflict } from '@/components/sites/site-conflict';
import { Button } from '@/components/ui/button';
import { FormDateField } from '@/components/ui/form-date-field';
import { FormProblem } from '@/components/ui/form-problem';
import { NumberField } from '@/components/ui/number-field';
import { numberTyped } from '@/components/ui/number-typed';
import { SelectField } from '@/components/ui/select-field';
import { TextField } from '@/components/ui/text-field';
import { listCountries } from '@/lib/countries';
import { ProblemError } from '@/lib/http/client';
import { useAddSite, useChangeSite } from '@/lib/sites/hooks';
import { addSiteBody, type SiteField, type SiteInput, type SiteView } from '@/lib/sites/schema';

type Typed = Record<Exclude<SiteField, 'cap'>, string> & { cap: number | null };

function typedOf(site: SiteInput | null): Typed {
  return {
    code: site?.code ?? '',
    name: site?.name ?? '',
    city: site?.city ?? '',
    country: site?.country ?? '',
    plannedEarliest: site?.plannedEarliest ?? '',
    plannedLikely: site?.plannedLikely ?? '',
    plannedLatest: site?.plannedLatest ?? '',
    activatedOn: site?.activatedOn ?? '',
    closedOn: site?.closedOn ?? '',
    cap: site?.cap ?? null,
  };
}

/** The form's fields are text; an empty date is none. */
function readTyped(typed: Typed) {
  const day = (text: string): string | null => (text === '' ? null : text);
  return addSiteBody.safeParse({
    ...typed,
    plannedEarliest: day(typed.plannedEarliest),
    plannedLikely: day(typed.plannedLikely),
    plannedLatest: day(typed.plannedLatest),
    activatedOn: day(typed.activatedOn),
    closedOn: day(typed.closedOn),
  });
}

interface SiteFormProps {
  code: string;
  /** The site to change; null: a new one. */
  site: SiteView | null;
  onDone: () => void;
  onLeave: () => void;
}

export function SiteForm({ code, site, onDone, onLeave }: SiteFormProps) {
  const form = useForm<Typed>({ defaultValues: typedOf(site) });
  const [version, setVersion] = useState(site?.version ?? 1);
  const [conflict, setConflict] = useState<{ mine: SiteInput; current: SiteView } | null>(null);
  const add = useAddSite(code);
  const change = useChangeSite(code);
  const { errors } = form.formState;

  const store = async (body: SiteInput, atVersion: number): Promise<void> => {
    try {
      if (site) await change.mutateAsync({ site: site.code, body: { ...body, version: atVersion } });
      else await add.mutateAsync(body);
      toast.success(site ? `Site ${body.code} is changed.` : `Site ${body.code} is added.`);
      onDone();
    } catch (error) {
      const problem = error instanceof ProblemError ? error.problem : null;
      if (problem?.status === 409 && problem.current)
        return setConflict({ mine: body, current: problem.current as SiteView });
      for (const fault of problem?.errors ?? [])
        form.setError(fault.pointer.slice(1) as SiteField, { message: fault.detail });
      if (!problem?.errors) form.setError('root', { message: (error as Error).message });
    }
  };

  const send = form.handleSubmit(async (typed) => {
    const read = readTyped(typed);
    if (read.success) return store(read.data, version);
    for (const issue of read.error.issues) form.setError(issue.path[0] as SiteField, { message: issue.message });
  });

  if (conflict) {
    return (
      <SiteConflict
        {...conflict}
        onKeep={() => {
          setConflict(null);
          setVersion(conflict.current.version);
          void store(conflict.mine, conflict.current.version);
        }}
        onTake={() => {
          setConflict(null);
          setVersion(conflict.current.version);
          form.reset(typedOf(conflict.current));
        }}
      />
    );
  }
  const text = (name: 'code' | 'name' | 'city', label: string) => (
    <TextField label={label} autoComplete="off" error={errors[name]?.message} {...form.register(name)} />
  );
  const date = (
    name: 'plannedEarliest' | 'plannedLikely' | 'plannedLatest' | 'activatedOn' | 'closedOn',
    label: string,
  ) => <FormDateField control={form.control} name={name} label={label} />;
  return (
    <form onSubmit={send} noValidate className="space-y-5">
      <FormProblem title="Not saved" message={errors.root?.message} />
      <div className="grid gap-3 sm:grid-cols-2">
        {text('code', 'Code')}
        {text('name', 'Name')}
        {text('city', 'City')}
        <SelectField
          label="Country"
          error={errors.country?.message}
          options={[
            { value: '', label: 'Choose a country' },
            ...listCountries().map((one) => ({ value: one.code, label: one.name })),
          ]}
          {...form.register('country')}
        />
      </div>
      <fieldset>
        <legend className="mb-1 font-600">Planned window of the activation</legend>
        <div className="grid gap-3 sm:grid-cols-3">
          {date('plannedEarliest', 'Earliest')}
          {date('plannedLikely', 'Likely')}
          {date('plannedLatest', 'Latest')}
        </div>
      </fieldset>
      <div className="grid gap-3 sm:grid-cols-3">
        {date('activatedOn', 'Activated on')}
        {date('closedOn', 'Closed on')}
        <NumberField
          label="Cap"
          whole
          unit="patients"
          error={errors.cap?.message}
          {...form.register('cap', { setValueAs: numberTyped })}
        />
      </div>
      <div className="flex flex-wrap gap-3">
        <Button type="submit" pending={add.isPending || change.isPending} pendingLabel="Saving">
          {site ? 'Save the site' : 'Add the site'}
        </Button>
        <Button variant="second" onClick={onLeave}>
          {site ? 'Leave as it was' : 'Go back'}
        </Button>
      </div>
    </form>
  );
}
