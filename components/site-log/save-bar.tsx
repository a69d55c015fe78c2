'use client';

import { countsInWords, monthName, saveWords, stillEmpty, typedMonths } from '@/components/site-log/sheet-figures';
import { type MonthSheetState, RETRY_SECONDS, type SaveOutcome } from '@/components/site-log/use-month-sheet';
import { Button } from '@/components/ui/button';
import { formatLongMonth, formatQuantity } from '@/lib/format';
import { LOG_FIELDS, type MonthEntry } from '@/lib/site-log/schema';

interface SaveBarProps {
  state: MonthSheetState;
  /** The month that "nothing happened" fills with noughts: the one in hand. */
  month: string;
}

/** Saving is explicit: one button, and beside it what was saved and when, or where the figures are meanwhile. */
export function SaveBar({ state, month }: SaveBarProps) {
  const { sheet, typed, outcome, saving } = state;
  const months = typedMonths(typed);
  const entry = sheet.months.find((one) => one.month === month);
  const hasEmpty = LOG_FIELDS.some((field) => entry?.[field] === null && !typed[month]?.[field]);
  return (
    <div className="max-md:sticky max-md:bottom-0 max-md:z-10 max-md:mt-3 max-md:grid max-md:gap-2 max-md:rule-double-t max-md:border-b max-md:border-rule max-md:bg-paper max-md:py-3 md:flex md:flex-wrap md:items-center md:gap-x-5 md:gap-y-2 md:py-3">
      <Button
        data-save
        pending={saving}
        pendingLabel="Saving"
        disabled={months.length === 0}
        onClick={() => void state.save()}
      >
        {saveWords(months.length > 0 ? months : [month], sheet.today)}
      </Button>
      {hasEmpty && (
        <Button variant="second" onClick={() => state.fillZeros(month)}>
          Nothing {LOG_FIELDS.some((field) => entry?.[field] !== null || typed[month]?.[field]) ? 'else ' : ''}happened
          in {monthName(month, sheet.today)}
        </Button>
      )}
      <div role="status" className="text-13 md:flex-1">
        <SaveLine state={state} outcome={outcome} />
      </div>
    </div>
  );
}

function SaveLine({ state, outcome }: { state: MonthSheetState; outcome: SaveOutcome | null }) {
  const wrong = Object.keys(state.faults).length;
  if (wrong > 0) return <p className="text-stop">Not saved: {formatQuantity(wrong, 'figure')} to put right.</p>;
  if (!outcome) return null;
  if (outcome.kind === 'saved') {
    return (
      <p>
        <b>Saved today at {clockTime(outcome.at)}.</b> <SavedWords entries={outcome.entries} />
      </p>
    );
  }
  if (outcome.kind === 'kept') {
    return (
      <div className="flex flex-wrap items-center gap-x-3 gap-y-1">
        <p>
          <b className="text-caution">Kept on this device, not sent.</b>{' '}
          {outcome.months.map(formatLongMonth).join(', ')}. Trying again every {RETRY_SECONDS} s.
        </p>
        <Button size="small" onClick={() => void state.save()}>
          Try now
        </Button>
      </div>
    );
  }
  return (
    <p className="text-stop">
      {outcome.message} {outcome.entries.length > 0 && <SavedWords entries={outcome.entries} />}
    </p>
  );
}

function SavedWords({ entries }: { entries: readonly MonthEntry[] }) {
  return entries.map((entry) => (
    <span key={entry.month}>
      {formatLongMonth(entry.month)}: {countsInWords(entry)}.{' '}
      <span className="text-caution">{stillEmpty(entry)}</span>{' '}
    </span>
  ));
}

/** The reader's own clock, as the rest of their day goes by it. */
function clockTime(at: Date): string {
  return `${String(at.getHours()).padStart(2, '0')}:${String(at.getMinutes()).padStart(2, '0')}`;
}
