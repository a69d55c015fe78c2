import type { ReactNode } from 'react';

/** A formula on a line of its own, set in the title's face. `spoken` reads it out where signs alone would not. */
export function Formula({ children, spoken }: { children: ReactNode; spoken?: string }) {
  return (
    <div
      role={spoken ? 'img' : undefined}
      aria-label={spoken}
      className="my-3 overflow-x-auto border-l border-rule-strong py-1 pl-5 font-title text-18"
    >
      {children}
    </div>
  );
}

/** Where a statement was published. */
export function Source({ children }: { children: ReactNode }) {
  return <p className="text-13 text-ink-soft">{children}</p>;
}
