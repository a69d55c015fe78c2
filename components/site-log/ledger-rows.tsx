'use client';

import { useState } from 'react';
import { CellInput, faultId } from '@/components/site-log/cell-input';
import { RevisionList } from '@/components/site-log/revision-list';
import { cellKey, dueWords } from '@/components/site-log/sheet-figures';
import { PencilIcon } from '@/components/site-log/sheet-icons';
import type { MonthSheetState } from '@/components/site-log/use-month-sheet';
import { Button } from '@/components/ui/button';
import { joinClasses } from '@/components/ui/join-classes';
import { formatDate, formatLongMonth, formatMonth } from '@/lib/format';
import { dueOn } from '@/lib/site-log/rules';
import { LOG_FIELD_NAMES, LOG_FIELDS, type LogField, type MonthEntry } from '@/lib/site-log/schema';

/** The double upright rule of a ledger, before the first figure and before the last column; single on a phone. */
export const LEDGER_EDGE = 'md:border-l-[3px] md:border-double md:border-rule-strong';
const FIGURE_LOOK = 'border-l border-rule text-right md:w-[92px]';
export const FIGURE_CELL = `${FIGURE_LOOK} px-3 max-md:py-0 max-md:pr-2 max-md:pl-0`;
export const figureEdge = (field: LogField): string => joinClasses(FIGURE_CELL, field === LOG_FIELDS[0] && LEDGER_EDGE);
export const MONTH_CELL = 'px-3 text-left font-400 whitespace-nowrap max-md:px-0';
const ICON_CELL = 'w-11 text-center';

interface RowProps {
  state: MonthSheetState;
  entry: MonthEntry;
  compact: boolean;
}

interface SavedRowProps extends RowProps {
  onCorrect: (() => void) | null;
}

/** A month that is saved: figures as they stand, who logged them, and the pencil. */
export function SavedRow({ state, entry, compact, onCorrect }: SavedRowProps) {
  const [showsRevisions, setShowsRevisions] = useState(false);
  const times = entry.revisions.length;
  const corrected = times > 0 && (
    <button
      type="button"
      aria-expanded={showsRevisions}
      onClick={() => setShowsRevisions(!showsRevisions)}
      className="block text-13 underline decoration-rule-strong underline-offset-3"
    >
      {times === 1 ? 'corrected once' : `corrected ${times} times`}
    </button>
  );
  return (
    <>
      <tr className="h-11 border-b border-rule md:h-[38px]">
        <th scope="row" className={MONTH_CELL}>
          {formatMonth(entry.month)}
          {compact && corrected}
        </th>
        {LOG_FIELDS.map((field) => (
          <td key={field} className={figureEdge(field)}>
            {entry[field] ?? (
              <span className="text-caution">
                –<span className="sr-only">not reported</span>
              </span>
            )}
          </td>
        ))}
        {!compact && (
          <td className={joinClasses('px-3 text-13 leading-4 text-ink-soft', LEDGER_EDGE)}>
            {entry.loggedAt && `${formatDate(entry.loggedAt.slice(0, 10))}, ${entry.loggedBy}`}
            {entry.state === 'incomplete' && !state.sheet.mayLog && (
              <span className="block text-caution">incomplete</span>
            )}
            {corrected}
          </td>
        )}
        {state.sheet.mayLog && (
          <td className={ICON_CELL}>{onCorrect && <PencilButton month={entry.month} onClick={onCorrect} />}</td>
        )}
      </tr>
      {showsRevisions && (
        <tr className="border-b border-rule bg-paper-sunk">
          <td colSpan={8} className="px-3 py-2">
            <RevisionList revisions={entry.revisions} />
          </td>
        </tr>
      )}
    </>
  );
}

function PencilButton({ month, onClick }: { month: string; onClick: () => void }) {
  return (
    <button
      type="button"
      aria-expanded="false"
      onClick={onClick}
      className="inline-grid h-11 w-11 place-items-center screen-only md:h-9"
    >
      <PencilIcon />
      <span className="sr-only">Correct {formatLongMonth(month)}</span>
    </button>
  );
}

/** A month that nobody logged: a gap, not a nought. */
export function GapRow({ state, entry, compact }: RowProps) {
  const month = formatLongMonth(entry.month).split(' ')[0]!;
  return (
    <tr className="h-11 border-b border-rule bg-caution-paper text-caution md:h-[38px]">
      <th scope="row" className={MONTH_CELL}>
        {formatMonth(entry.month)}
      </th>
      <td colSpan={5} className={joinClasses('px-3 text-13 max-md:px-2', LEDGER_EDGE)}>
        <b>Not logged.</b>
        {!compact && (
          <> Not counted as zero: the forecast fills the gap until {state.sheet.mayLog ? 'you do' : 'it is'}.</>
        )}
      </td>
      {(!compact || state.sheet.mayLog) && (
        <td colSpan={2} className="pr-2 text-right">
          {state.sheet.mayLog && !compact && (
            <Button
              variant="second"
              size="small"
              className="border-caution text-caution"
              onClick={() => state.openMonth(entry.month)}
            >
              Log {month}
            </Button>
          )}
        </td>
      )}
    </tr>
  );
}

/** A month with cells to type into; figures of it that are saved stand as they are, under the pencil. */
export function OpenRow({ state, entry, onCorrect }: Omit<SavedRowProps, 'compact'>) {
  const wrong = LOG_FIELDS.filter((field) => state.faults[cellKey(entry.month, field)]);
  return (
    <>
      <tr className="border-t-2 border-b border-t-ink border-b-rule">
        <th scope="row" className="px-3 text-left font-title text-18 font-500 whitespace-nowrap">
          {formatMonth(entry.month)}
        </th>
        {LOG_FIELDS.map((field) => (
          <td
            key={field}
            className={
              entry[field] === null
                ? joinClasses(FIGURE_LOOK, 'p-[3px]', field === LOG_FIELDS[0] && LEDGER_EDGE)
                : figureEdge(field)
            }
          >
            {entry[field] ?? (
              <CellInput state={state} month={entry.month} field={field} className="md:px-[9px] md:py-1" />
            )}
          </td>
        ))}
        <td className={joinClasses('px-3 text-13 text-ink-soft', LEDGER_EDGE)}>
          {entry.state === 'incomplete' && entry.loggedAt
            ? `begun ${formatDate(entry.loggedAt.slice(0, 10))}`
            : `due ${dueWords(dueOn(entry.month))}`}
        </td>
        <td className={ICON_CELL}>{onCorrect && <PencilButton month={entry.month} onClick={onCorrect} />}</td>
      </tr>
      {wrong.length > 0 && (
        <tr>
          <td />
          <td colSpan={7} className="px-3 pb-2 text-13 text-stop">
            {wrong.map((field) => (
              <p key={field} id={faultId(entry.month, field)}>
                {LOG_FIELD_NAMES[field]}: {state.faults[cellKey(entry.month, field)]}
              </p>
            ))}
          </td>
        </tr>
      )}
    </>
  );
}
