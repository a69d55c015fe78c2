import type { ReactNode } from 'react';
import { joinClasses } from '@/components/ui/join-classes';

export interface Footnote {
  mark: string;
  text: ReactNode;
}

interface FootnotesProps {
  title: ReactNode;
  notes: readonly Footnote[];
  /** Stands under a hairline after the last note. */
  rest?: ReactNode;
  action?: ReactNode;
  /** Two columns where the block is as wide as the page. */
  columns?: 1 | 2;
  id?: string;
  className?: string;
}

/** Notes to marks, as under a printed table: every † in the page is explained in one place. */
export function Footnotes({ title, notes, rest, action, columns = 1, id, className }: FootnotesProps) {
  return (
    <section id={id} className={joinClasses('border-y border-caution bg-caution-paper px-5 pt-3 pb-4', className)}>
      <h2 className="text-caution">{title}</h2>
      <ul className={columns === 2 ? 'gap-x-5 md:grid md:grid-cols-2' : undefined}>
        {notes.map((note) => (
          <li key={note.mark} className="mt-2 grid grid-cols-[24px_1fr]">
            <span className="font-600 text-caution">{note.mark}</span>
            <span>{note.text}</span>
          </li>
        ))}
      </ul>
      {rest && <div className="mt-3 border-t border-caution/35 pt-2 text-13">{rest}</div>}
      {action && <div className="mt-3">{action}</div>}
    </section>
  );
}

/** The marks beside a date that cautions touch. */
export function CautionMarks({ marks }: { marks?: string | null }) {
  if (!marks) return null;
  return (
    <span className="pl-1 font-600 whitespace-nowrap text-caution">
      <span className="sr-only">see caution </span>
      {marks}
    </span>
  );
}
