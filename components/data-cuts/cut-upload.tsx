'use client';

import { useRouter } from 'next/navigation';
import { useRef, useState } from 'react';
import { CutPreview } from '@/components/data-cuts/cut-preview';
import { Button } from '@/components/ui/button';
import { DateField } from '@/components/ui/date-field';
import { Field } from '@/components/ui/field';
import { Notice } from '@/components/ui/notice';
import { TextareaField } from '@/components/ui/textarea-field';
import { sayDone } from '@/components/ui/toaster';
import { useAcceptCut, usePreviewCut } from '@/lib/data-cuts/hooks';
import type { CutPreview as Preview } from '@/lib/data-cuts/schema';
import { ProblemError } from '@/lib/http/client';

interface CutUploadProps {
  code: string;
  /** The last day of the last month that is over: the usual cut-off. */
  lastMonthEnd: string;
}

interface Refusal {
  fileName: string;
  sentences: string[];
}

/** Cut-off, file, look, accept: nothing is stored before the last step. */
export function CutUpload({ code, lastMonthEnd }: CutUploadProps) {
  const router = useRouter();
  const input = useRef<HTMLInputElement>(null);
  const [cutoffOn, setCutoffOn] = useState(lastMonthEnd);
  const [file, setFile] = useState<File | null>(null);
  const [shown, setShown] = useState<Preview | null>(null);
  const [refusal, setRefusal] = useState<Refusal | null>(null);
  const [note, setNote] = useState('');
  const [faults, setFaults] = useState<{ cutoffOn?: string; note?: string }>({});
  const preview = usePreviewCut(code);
  const accept = useAcceptCut(code);

  const tell = (chosen: File, error: unknown): void => {
    const problem = error instanceof ProblemError ? error : null;
    const beside = { cutoffOn: problem?.fault('/cutoffOn'), note: problem?.fault('/note') };
    setFaults(beside);
    if (beside.cutoffOn || beside.note) return;
    const sentences = problem?.problem.errors?.map((fault) => fault.detail) ?? [(error as Error).message];
    setShown(null);
    setRefusal({ fileName: chosen.name, sentences });
  };
  // The answer to the last question counts, however long an earlier one takes.
  const latest = useRef(0);
  const look = async (chosen: File, on: string): Promise<void> => {
    latest.current += 1;
    const question = latest.current;
    setFile(chosen);
    setShown(null);
    setRefusal(null);
    setFaults({});
    try {
      const read = await preview.mutateAsync({ file: chosen, cutoffOn: on });
      if (latest.current === question) setShown(read);
    } catch (error) {
      if (latest.current === question) tell(chosen, error);
    }
  };
  const keep = async (chosen: File, on: string): Promise<void> => {
    try {
      const cut = await accept.mutateAsync({ file: chosen, cutoffOn: on, note });
      sayDone(`Data cut ${cut.number} is accepted.`);
      router.push(`/studies/${code}/data-cuts/${cut.number}`);
      router.refresh();
    } catch (error) {
      tell(chosen, error);
    }
  };

  return (
    <>
      <div className="max-w-measure gap-5 space-y-5 md:grid md:grid-cols-[14rem_1fr] md:space-y-0">
        <DateField
          id="cut-off"
          label="Cut-off"
          value={cutoffOn}
          onChange={(value) => {
            setCutoffOn(value);
            setShown(null);
          }}
          onBlur={() => {
            if (file && !shown && !preview.isPending) void look(file, cutoffOn);
          }}
          error={faults.cutoffOn}
          hint="Data hold to the end of this day."
        />
        <Field id="listing" label="Subject listing, as CSV">
          {(wiring) => (
            <input
              {...wiring}
              ref={input}
              type="file"
              accept=".csv,.tsv,.txt,text/csv"
              className="block w-full text-15 file:mr-3 file:min-h-11 file:rounded file:border file:border-solid file:border-rule-strong file:bg-transparent file:px-5 md:file:min-h-10"
              onChange={(event) => {
                const chosen = event.target.files?.[0];
                // Cleared, so that the same file can be chosen again once it has been put right.
                event.target.value = '';
                if (chosen) void look(chosen, cutoffOn);
              }}
            />
          )}
        </Field>
      </div>
      {preview.isPending && (
        <p role="status" className="mt-5">
          Reading {file?.name} …
        </p>
      )}
      {refusal && (
        <Notice tone="stop" live className="mt-5" title={`${refusal.fileName} was not taken. Nothing is stored.`}>
          <ul className="max-h-96 space-y-1 overflow-y-auto">
            {refusal.sentences.map((sentence) => (
              <li key={sentence}>{sentence}</li>
            ))}
          </ul>
        </Notice>
      )}
      {file && shown && (
        <CutPreview preview={shown}>
          <TextareaField
            id="cut-note"
            rows={3}
            label={shown.noteNeeded ? 'Why listing and log differ' : 'Note'}
            hint={
              shown.noteNeeded
                ? 'Needed: it stands beside the cut for good.'
                : 'Where something about the cut should be known later.'
            }
            value={note}
            onChange={(event) => setNote(event.target.value)}
            error={faults.note}
            fieldClassName="max-w-measure"
          />
          <div className="mt-5 flex flex-wrap gap-3">
            <Button
              pending={accept.isPending}
              pendingLabel="Accepting"
              onClick={() => {
                if (shown.noteNeeded && note.trim() === '') setFaults({ note: 'Say in a note why they differ.' });
                else void keep(file, shown.cutoffOn);
              }}
            >
              Accept the data cut
            </Button>
            <Button variant="second" onClick={() => input.current?.click()}>
              Choose another file
            </Button>
          </div>
        </CutPreview>
      )}
    </>
  );
}
