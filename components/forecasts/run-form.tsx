'use client';

import { useRouter } from 'next/navigation';
import { type FormEvent, useState } from 'react';
import { Button } from '@/components/ui/button';
import { DateField } from '@/components/ui/date-field';
import { ErrorSummary, type SummarisedError } from '@/components/ui/error-summary';
import { NumberField } from '@/components/ui/number-field';
import { numberTyped } from '@/components/ui/number-typed';
import { SelectField } from '@/components/ui/select-field';
import { formatDate, formatQuantity } from '@/lib/format';
import { useRequestForecast } from '@/lib/forecasts/hooks';
import { requestForecastBody, type RunChoices } from '@/lib/forecasts/schema';
import { ProblemError } from '@/lib/http/client';

interface RunFormProps {
  code: string;
  choices: RunChoices;
  plan: NonNullable<RunChoices['plan']>;
  /** The cut that was chosen on the way here. */
  cut: number | null;
}

const FIELDS: Record<string, string> = {
  '/dataCutNumber': 'run-cut',
  '/cutoffOn': 'run-cutoff',
  '/draws': 'run-draws',
  '/seed': 'run-seed',
};

interface Fault {
  pointer: string;
  detail: string;
}

/** Which data, how many draws, which seed. What can't be computed is said here, before anything is queued. */
export function RunForm({ code, choices, plan, cut }: RunFormProps) {
  const router = useRouter();
  const request = useRequestForecast(code);
  const [cutNumber, setCutNumber] = useState(cut === null ? '' : String(cut));
  const [cutoffOn, setCutoffOn] = useState(choices.lastMonthEnd);
  const [draws, setDraws] = useState(String(plan.draws));
  const [seed, setSeed] = useState(String(plan.seed));
  const [faults, setFaults] = useState<Fault[]>([]);
  const chosen = choices.cuts.find((one) => String(one.number) === cutNumber);
  const faultAt = (pointer: string): string | undefined => faults.find((fault) => fault.pointer === pointer)?.detail;

  const run = async (event: FormEvent): Promise<void> => {
    event.preventDefault();
    const typed = {
      dataCutNumber: chosen?.number ?? null,
      cutoffOn: chosen?.cutoffOn ?? cutoffOn,
      draws: numberTyped(draws) ?? Number.NaN,
      seed: numberTyped(seed) ?? Number.NaN,
    };
    const parsed = requestForecastBody.safeParse(typed);
    if (!parsed.success) {
      setFaults(parsed.error.issues.map((issue) => ({ pointer: `/${issue.path.join('/')}`, detail: issue.message })));
      return;
    }
    setFaults([]);
    try {
      const { number } = await request.mutateAsync(parsed.data);
      router.push(`/studies/${code}/forecasts/${number}`);
      router.refresh();
    } catch (error) {
      const told = error instanceof ProblemError ? error.problem.errors : undefined;
      setFaults(told ?? [{ pointer: '', detail: (error as Error).message }]);
    }
  };

  const summary = faults
    .filter(({ pointer }) => !FIELDS[pointer])
    .map(({ pointer, detail }): SummarisedError => ({ where: pointer || undefined, message: detail }));
  return (
    <form noValidate onSubmit={(event) => void run(event)} className="max-w-measure space-y-5">
      <ErrorSummary errors={summary} />
      <SelectField
        id={FIELDS['/dataCutNumber']}
        label="Data cut"
        value={cutNumber}
        onChange={(event) => setCutNumber(event.target.value)}
        error={faultAt('/dataCutNumber')}
        hint={cutHint(choices, plan, chosen !== undefined)}
        options={[
          ...choices.cuts.map((one) => ({
            value: String(one.number),
            label: `${one.number}: data to ${formatDate(one.cutoffOn)}, ${formatQuantity(one.subjects, 'subject')}${one.kind === 'aggregate' ? ', totals' : ''}`,
          })),
          { value: '', label: 'No data cut' },
        ]}
      />
      <DateField
        id={FIELDS['/cutoffOn']}
        label="Cut-off"
        value={chosen?.cutoffOn ?? cutoffOn}
        onChange={setCutoffOn}
        readOnly={chosen !== undefined}
        error={faultAt('/cutoffOn')}
        hint={
          chosen
            ? 'The cut’s own day.'
            : 'What is logged after this day is left out. The forecast begins the day after.'
        }
      />
      <div className="gap-5 space-y-5 md:grid md:grid-cols-2 md:space-y-0">
        <NumberField
          id={FIELDS['/draws']}
          whole
          label="Draws"
          value={draws}
          onChange={(event) => setDraws(event.target.value)}
          error={faultAt('/draws')}
          hint="More draws take longer and leave less simulation error."
        />
        <NumberField
          id={FIELDS['/seed']}
          whole
          label="Seed"
          value={seed}
          onChange={(event) => setSeed(event.target.value)}
          error={faultAt('/seed')}
          hint="The same data and seed give the same forecast, to the last digit."
        />
      </div>
      <Button type="submit" pending={request.isPending} pendingLabel="Checking the study file">
        Run the forecast
      </Button>
    </form>
  );
}

function cutHint({ logged, cuts }: RunChoices, plan: NonNullable<RunChoices['plan']>, chosen: boolean): string | null {
  if (chosen) return 'Who was randomised and what became of them. Which months a site has reported comes from the log.';
  if (!plan.hasEvents) return 'The plan has no events. Who was randomised comes from the log.';
  if (logged > 0)
    return `Without a data cut nothing is known of events: the run forecasts enrolment only.${cuts.length === 0 ? ' Upload one to forecast events.' : ''}`;
  return 'Nobody is randomised yet: events follow the plan alone.';
}
