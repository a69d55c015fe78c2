'use client';

import { useRouter } from 'next/navigation';
import { useRef, useState } from 'react';
import { toast } from 'sonner';
import { SiteListPreview } from '@/components/sites/site-list-preview';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { formatQuantity } from '@/lib/format';
import { ProblemError } from '@/lib/http/client';
import { useAcceptSiteList, usePreviewSiteList } from '@/lib/site-lists/hooks';
import type { SitePreview } from '@/lib/site-lists/schema';

interface Refusal {
  fileName: string;
  sentences: string[];
}

function refusalOf(file: File, error: unknown): Refusal {
  const faults = error instanceof ProblemError ? error.problem.errors : undefined;
  return { fileName: file.name, sentences: faults?.map((fault) => fault.detail) ?? [(error as Error).message] };
}

/** Choose, look, accept: nothing is stored before the last step, and then all of it or none. */
export function SiteListUpload({ code }: { code: string }) {
  const input = useRef<HTMLInputElement>(null);
  const [chosen, setChosen] = useState<{ file: File; preview: SitePreview } | null>(null);
  const [refusal, setRefusal] = useState<Refusal | null>(null);
  const preview = usePreviewSiteList(code);
  const accept = useAcceptSiteList(code);
  const router = useRouter();

  // The file chosen last is the one on show, however long an earlier one takes.
  const latest = useRef<File | null>(null);
  const look = async (file: File): Promise<void> => {
    latest.current = file;
    setChosen(null);
    setRefusal(null);
    try {
      const read = await preview.mutateAsync(file);
      if (latest.current === file) setChosen({ file, preview: read });
    } catch (error) {
      if (latest.current === file) setRefusal(refusalOf(file, error));
    }
  };
  const add = async (file: File): Promise<void> => {
    try {
      const { added } = await accept.mutateAsync(file);
      toast.success(`${formatQuantity(added, 'site')} added.`);
      router.push(`/studies/${code}/sites`);
      router.refresh();
    } catch (error) {
      setChosen(null);
      setRefusal(refusalOf(file, error));
    }
  };
  return (
    <>
      <label htmlFor="site-list" className="mb-1 block text-13 font-600">
        Site list, as CSV
      </label>
      <input
        ref={input}
        id="site-list"
        type="file"
        accept=".csv,.tsv,.txt,text/csv"
        className="block text-15 file:mr-3 file:min-h-11 file:rounded file:border file:border-solid file:border-rule-strong file:bg-transparent file:px-5 md:file:min-h-10"
        onChange={(event) => {
          const file = event.target.files?.[0];
          // Cleared, so that the same file can be chosen again once it has been put right.
          event.target.value = '';
          if (file) void look(file);
        }}
      />
      {preview.isPending && (
        <p role="status" className="mt-3">
          Reading the list …
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
      {chosen && (
        <SiteListPreview preview={chosen.preview}>
          <Button pending={accept.isPending} pendingLabel="Adding" onClick={() => void add(chosen.file)}>
            Add {formatQuantity(chosen.preview.total, 'site')}
          </Button>
          <Button variant="second" onClick={() => input.current?.click()}>
            Choose another file
          </Button>
        </SiteListPreview>
      )}
    </>
  );
}
