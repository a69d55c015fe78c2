import { joinClasses } from '@/components/ui/join-classes';

export type MarkKind = 'patients' | 'events' | 'date' | 'planned';

const LABELS: Record<MarkKind, string> = { patients: 'patients', events: 'events', date: 'a date', planned: 'planned' };

const COLOURS: Record<MarkKind, string> = {
  patients: 'text-patients',
  events: 'text-events',
  date: 'text-ink',
  planned: 'text-plan',
};

interface MarkProps {
  kind: MarkKind;
  /** Said aloud only where no word beside it says the same. */
  labelled?: boolean;
  className?: string;
}

/** Disc for patients, square for events, triangle for a date without a count, open diamond for a planned one. */
export function Mark({ kind, labelled = false, className }: MarkProps) {
  return (
    <svg
      viewBox="0 0 11 11"
      width="11"
      height="11"
      role={labelled ? 'img' : undefined}
      aria-label={labelled ? LABELS[kind] : undefined}
      aria-hidden={labelled ? undefined : true}
      className={joinClasses('inline-block align-[-0.5px]', COLOURS[kind], className)}
    >
      {kind === 'patients' && <circle cx="5.5" cy="5.5" r="4.5" fill="currentColor" />}
      {kind === 'events' && <rect x="1.2" y="1.2" width="8.6" height="8.6" fill="currentColor" />}
      {kind === 'date' && <path d="M5.5 1 10 9.6 1 9.6z" fill="currentColor" />}
      {kind === 'planned' && (
        <path d="M5.5 1 10 5.5 5.5 10 1 5.5z" fill="none" stroke="currentColor" strokeWidth="1.5" />
      )}
    </svg>
  );
}

/** The mark that belongs to a milestone of this kind. */
export function markOfMilestone(kind: 'randomised' | 'events' | 'follow-up' | 'all-of'): MarkKind {
  if (kind === 'randomised') return 'patients';
  return kind === 'events' ? 'events' : 'date';
}
