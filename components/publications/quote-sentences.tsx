'use client';

import { useState } from 'react';
import { Button } from '@/components/ui/button';

interface Props {
  sentences: { code: string; text: string }[];
}

/** Sentences that carry all that a date needs, ready to be passed on. */
export function QuoteSentences({ sentences }: Props) {
  const [copied, setCopied] = useState<{ code: string; done: boolean } | null>(null);
  const copy = (code: string, text: string): void => {
    const say = (done: boolean) => () => setCopied({ code, done });
    navigator.clipboard.writeText(text).then(say(true), say(false));
  };
  return (
    <ul>
      {sentences.map(({ code, text }) => (
        <li
          key={code}
          className="border-b border-rule py-3 last:border-b-0 md:flex md:items-start md:justify-between md:gap-5"
        >
          <p className="max-w-[84ch]">{text}</p>
          <div className="mt-2 flex-none md:mt-0 md:w-40">
            <Button variant="second" size="small" onClick={() => copy(code, text)}>
              Copy the sentence
            </Button>
            <p role="status" className="mt-1 text-13 text-ink-soft">
              {copied?.code === code &&
                (copied.done ? 'Copied.' : 'The browser did not allow it. Mark the sentence and copy it.')}
            </p>
          </div>
        </li>
      ))}
    </ul>
  );
}
