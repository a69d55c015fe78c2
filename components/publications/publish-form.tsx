'use client';

import { zodResolver } from '@hookform/resolvers/zod';
import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { useForm, useWatch } from 'react-hook-form';
import { Button } from '@/components/ui/button';
import { ConfirmDialog } from '@/components/ui/confirm-dialog';
import { FormProblem } from '@/components/ui/form-problem';
import { TextareaField } from '@/components/ui/textarea-field';
import { sayDone } from '@/components/ui/toaster';
import { ROLE_NAMES } from '@/lib/auth/permissions';
import type { Caution, MilestoneForecast } from '@/lib/engine/types';
import { cautionMark, formatCount, formatDate, formatPercent, formatQuantity } from '@/lib/format';
import { ProblemError } from '@/lib/http/client';
import { usePublishForecast } from '@/lib/publications/hooks';
import { inOrderOfTime, milestoneWords, nameOfMilestone } from '@/lib/publications/rules';
import { NOTE_LENGTH, type PublishBody, publishBody, type ReaderCount } from '@/lib/publications/schema';

export interface PublishFormProps {
  code: string;
  run: { number: number; dataCutoff: string };
  cautions: readonly Pick<Caution, 'code' | 'sponsorText'>[];
  milestones: readonly MilestoneForecast[];
  /** From `countReaders`: those who will see it. */
  readers: readonly ReaderCount[];
}

const rolesWords = (readers: readonly ReaderCount[]): string =>
  readers
    .filter(({ count }) => count > 0)
    .map(({ role, count }) => formatQuantity(count, ROLE_NAMES[role]))
    .join(', ');

/** A forecast leaves the building: a note, who will read it, what goes along, and one question that names all three. */
export function PublishForm({ code, run, cautions, milestones, readers }: PublishFormProps) {
  const router = useRouter();
  const publish = usePublishForecast(code);
  const [asking, setAsking] = useState(false);
  const form = useForm<PublishBody>({
    resolver: zodResolver(publishBody),
    defaultValues: { runNumber: run.number, note: '', confirm: true },
  });
  const { errors } = form.formState;
  const note = useWatch({ control: form.control, name: 'note' });
  const count = readers.reduce((sum, reader) => sum + reader.count, 0);
  const sponsors = readers.find(({ role }) => role === 'sponsor')?.count ?? 0;

  const send = form.handleSubmit(async (body) => {
    try {
      const { number } = await publish.mutateAsync(body);
      sayDone(`Publication ${number} is out.`);
      router.push(`/studies/${encodeURIComponent(code)}/timeline`);
      router.refresh();
    } catch (error) {
      const faults = error instanceof ProblemError ? (error.problem.errors ?? []) : [];
      for (const { pointer, detail } of faults)
        form.setError(pointer === '/note' ? 'note' : 'root', { message: detail });
      if (faults.length === 0) form.setError('root', { message: (error as Error).message });
    } finally {
      setAsking(false);
    }
  });

  return (
    <form noValidate className="max-w-measure space-y-5" onSubmit={form.handleSubmit(() => setAsking(true))}>
      <FormProblem title="Not published" message={errors.root?.message} />
      <TextareaField
        label="Note for the readers"
        hint={`What moved, and why, in plain words. No figure of a site. ${formatCount(note.trim().length)} of ${formatCount(NOTE_LENGTH)} characters.`}
        error={errors.note?.message}
        maxLength={NOTE_LENGTH + 200}
        {...form.register('note')}
      />
      <div>
        <h3>Who will read it</h3>
        <ul className="mt-1">
          {readers.map((reader) => (
            <li key={reader.role}>{formatQuantity(reader.count, ROLE_NAMES[reader.role])}</li>
          ))}
        </ul>
        {sponsors === 0 && (
          <p className="mt-1 text-caution">
            No sponsor viewer has a role in this study yet: only its team would see it.
          </p>
        )}
      </div>
      <div>
        <h3>What goes along</h3>
        {cautions.length === 0 ? (
          <p className="mt-1">No caution, and the sentence that the decision rests with you.</p>
        ) : (
          <ul className="mt-1 space-y-1">
            {cautions.map((caution, place) => (
              <li key={caution.code} className="grid grid-cols-[24px_1fr]">
                <span className="font-600 text-caution">{cautionMark(place)}</span>
                <span>{caution.sponsorText}</span>
              </li>
            ))}
          </ul>
        )}
      </div>
      <Button type="submit">Publish to sponsor</Button>
      <ConfirmDialog
        open={asking}
        onOpenChange={setAsking}
        title={`Publish to ${formatQuantity(count, 'reader')}?`}
        description={`${rolesWords(readers) || 'Nobody yet'}. They see run ${run.number}, from data to ${formatDate(run.dataCutoff)}, with your note and ${formatQuantity(cautions.length, 'caution')}. It can be superseded by a later one, not changed or taken back.`}
        verb="Publish to sponsor"
        pending={publish.isPending}
        onConfirm={() => void send()}
      >
        <ul>
          {inOrderOfTime(milestones).map((milestone) => {
            const { range, isRange } = milestoneWords(milestone);
            return (
              <li key={milestone.code}>
                <b>{nameOfMilestone(milestone)}</b> {range}
                {isRange && <>, {formatPercent(0.8)}</>}
              </li>
            );
          })}
        </ul>
      </ConfirmDialog>
    </form>
  );
}
