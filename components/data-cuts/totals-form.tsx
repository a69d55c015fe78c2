'use client';

import { useRouter } from 'next/navigation';
import { type FormEvent, useState } from 'react';
import { Button } from '@/components/ui/button';
import { DateField } from '@/components/ui/date-field';
import { ErrorSummary } from '@/components/ui/error-summary';
import { NumberField } from '@/components/ui/number-field';
import { numberTyped } from '@/components/ui/number-typed';
import { TextareaField } from '@/components/ui/textarea-field';
import { sayDone } from '@/components/ui/toaster';
import { useAcceptAggregate } from '@/lib/data-cuts/hooks';
import { acceptAggregateBody } from '@/lib/data-cuts/schema';
import { ProblemError } from '@/lib/http/client';

const COUNTS = [
  { field: 'events', label: 'Events', unit: 'subjects' },
  { field: 'withdrawn', label: 'Withdrawn', unit: 'subjects' },
  { field: 'atRisk', label: 'At risk', unit: 'subjects' },
  { field: 'personMonths', label: 'Time at risk, together', unit: 'months' },
] as const;
type CountField = (typeof COUNTS)[number]['field'];

/** Totals where no listing may be had: enough for a constant hazard and no more. */
export function TotalsForm({ code, lastMonthEnd }: { code: string; lastMonthEnd: string }) {
  const router = useRouter();
  const accept = useAcceptAggregate(code);
  const [cutoffOn, setCutoffOn] = useState(lastMonthEnd);
  const [typed, setTyped] = useState<Record<CountField, string>>({
    events: '',
    withdrawn: '',
    atRisk: '',
    personMonths: '',
  });
  const [note, setNote] = useState('');
  const [faults, setFaults] = useState<Record<string, string>>({});

  const keep = async (event: FormEvent): Promise<void> => {
    event.preventDefault();
    const counts = Object.fromEntries(COUNTS.map(({ field }) => [field, numberTyped(typed[field]) ?? Number.NaN]));
    const parsed = acceptAggregateBody.safeParse({ cutoffOn, ...counts, note });
    if (!parsed.success) {
      setFaults(Object.fromEntries(parsed.error.issues.map((issue) => [`/${issue.path.join('/')}`, issue.message])));
      return;
    }
    setFaults({});
    try {
      const cut = await accept.mutateAsync(parsed.data);
      sayDone(`Data cut ${cut.number} is accepted.`);
      router.push(`/studies/${code}/data-cuts/${cut.number}`);
      router.refresh();
    } catch (error) {
      const told = error instanceof ProblemError ? error.problem.errors : undefined;
      setFaults(
        Object.fromEntries(told?.map(({ pointer, detail }) => [pointer, detail]) ?? [['', (error as Error).message]]),
      );
    }
  };
  return (
    <form noValidate onSubmit={(event) => void keep(event)} className="mt-3 max-w-measure space-y-5">
      {faults[''] && <ErrorSummary errors={[{ message: faults[''] }]} />}
      <DateField
        id="totals-cut-off"
        label="Cut-off"
        value={cutoffOn}
        onChange={setCutoffOn}
        error={faults['/cutoffOn']}
        fieldClassName="max-w-56"
      />
      <div className="grid gap-5 md:grid-cols-2">
        {COUNTS.map(({ field, label, unit }) => (
          <NumberField
            key={field}
            id={`totals-${field}`}
            whole={field !== 'personMonths'}
            label={label}
            unit={unit}
            value={typed[field]}
            onChange={(event) => setTyped({ ...typed, [field]: event.target.value })}
            error={faults[`/${field}`]}
          />
        ))}
      </div>
      <TextareaField
        id="totals-note"
        rows={3}
        label="Note"
        hint="Needed where the totals and the log differ."
        value={note}
        onChange={(event) => setNote(event.target.value)}
        error={faults['/note']}
      />
      <Button type="submit" pending={accept.isPending} pendingLabel="Accepting">
        Accept the totals
      </Button>
    </form>
  );
}
