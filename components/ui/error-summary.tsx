'use client';

import { useEffect, useRef } from 'react';

export interface SummarisedError {
  /** Where it is: the id of the control, so that the line leads there. */
  fieldId?: string;
  /** The field's name or the JSON Pointer. */
  where?: string;
  message: string;
}

interface ErrorSummaryProps {
  errors: readonly SummarisedError[];
  title?: string;
}

/** All faults at once, at the top, with ways to each. It takes the focus when it comes up. */
export function ErrorSummary({ errors, title }: ErrorSummaryProps) {
  const box = useRef<HTMLDivElement>(null);
  const count = errors.length;
  useEffect(() => {
    if (count > 0) box.current?.focus();
  }, [count]);
  if (count === 0) return null;
  return (
    <div ref={box} tabIndex={-1} role="alert" className="border-y border-stop px-5 py-3">
      <p className="font-600 text-stop">
        {title ?? (count === 1 ? 'One thing to put right' : `${count} things to put right`)}
      </p>
      <ul className="mt-1 space-y-1">
        {errors.map((error) => (
          <li key={`${error.fieldId ?? error.where}-${error.message}`}>
            {error.where && <span className="font-600">{error.where}: </span>}
            {error.fieldId ? <a href={`#${error.fieldId}`}>{error.message}</a> : error.message}
          </li>
        ))}
      </ul>
    </div>
  );
}
