import { formatInstant } from '@/lib/format';
import { CORRECTION_REASON_NAMES, LOG_FIELD_NAMES, type RevisionView } from '@/lib/site-log/schema';

const shown = (value: number | null): string => (value === null ? 'empty' : String(value));

/** What was changed after the first save: old, new, who, when and why. Nothing is overwritten. */
export function RevisionList({ revisions }: { revisions: readonly RevisionView[] }) {
  return (
    <ul className="space-y-1 text-13">
      {revisions.map((revision) => (
        <li key={`${revision.field}-${revision.changedAt}`}>
          {LOG_FIELD_NAMES[revision.field]}: <s className="text-ink-soft">{shown(revision.oldValue)}</s> became{' '}
          <b>{shown(revision.newValue)}</b>.{' '}
          {revision.reasonKind && <>{CORRECTION_REASON_NAMES[revision.reasonKind]}: </>}“{revision.reason}”{' '}
          <span className="text-ink-soft">
            {revision.changedBy}, {formatInstant(revision.changedAt)} UTC
          </span>
        </li>
      ))}
    </ul>
  );
}
