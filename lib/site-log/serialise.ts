import type { CorrectionReason, LogField, MonthCounts, MonthEntry, RevisionView } from './schema';
import { monthState, NO_COUNTS } from './rules';

/** A row of `site_month` as SQL gives it, dates as text. */
export interface SiteMonthRecord {
  id: string;
  month: string;
  screened: number | null;
  failed: number | null;
  randomised: number | null;
  events: number | null;
  withdrawn: number | null;
  version: number;
  logged_at: Date;
  logged_by: string;
}

export interface RevisionRecord {
  site_month_id: string;
  field: LogField;
  old_value: number | null;
  new_value: number | null;
  reason_kind: CorrectionReason | null;
  reason: string | null;
  changed_at: Date;
  changed_by: string;
}

/** The five figures alone, out of a record or an entity. */
export function countsOf({
  screened = null,
  failed = null,
  randomised = null,
  events = null,
  withdrawn = null,
}: Partial<MonthCounts>): MonthCounts {
  return { screened, failed, randomised, events, withdrawn };
}

function serialiseRevision(record: RevisionRecord): RevisionView {
  return {
    field: record.field,
    oldValue: record.old_value,
    newValue: record.new_value,
    reasonKind: record.reason_kind,
    reason: record.reason,
    changedAt: new Date(record.changed_at).toISOString(),
    changedBy: record.changed_by,
  };
}

/** A month of the sheet; without a record: nothing logged, which is not nought. */
export function serialiseMonth(
  month: string,
  record: SiteMonthRecord | undefined,
  revisions: readonly RevisionRecord[],
): MonthEntry {
  if (!record)
    return { month, state: 'missing', ...NO_COUNTS, version: null, loggedAt: null, loggedBy: null, revisions: [] };
  const counts = countsOf(record);
  return {
    month,
    state: monthState(counts),
    ...counts,
    version: record.version,
    loggedAt: new Date(record.logged_at).toISOString(),
    loggedBy: record.logged_by,
    revisions: revisions.filter((one) => one.site_month_id === record.id).map(serialiseRevision),
  };
}
