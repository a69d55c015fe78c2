import type { ReactNode } from 'react';
import { joinClasses } from '@/components/ui/join-classes';

interface SectionProps {
  title: ReactNode;
  /** A line at the right of the title, in secondary ink. */
  aside?: ReactNode;
  id?: string;
  className?: string;
  children: ReactNode;
}

/** Hangs from an ink hairline. */
export function Section({ title, aside, id, className, children }: SectionProps) {
  return (
    <section id={id} className={joinClasses('mt-8 border-t border-ink pt-[11px] md:mt-13', className)}>
      <header className="mb-3 items-baseline justify-between gap-5 md:flex">
        <h2>{title}</h2>
        {aside && <div className="text-13 text-ink-soft">{aside}</div>}
      </header>
      {children}
    </section>
  );
}
