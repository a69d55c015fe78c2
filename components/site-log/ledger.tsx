'use client';

import { useState } from 'react';
import { CorrectionRows } from '@/components/site-log/correction-rows';
import { FIGURE_CELL, figureEdge, GapRow, LEDGER_EDGE, OpenRow, SavedRow } from '@/components/site-log/ledger-rows';
import type { MonthSheetState } from '@/components/site-log/use-month-sheet';
import { Button } from '@/components/ui/button';
import { joinClasses } from '@/components/ui/join-classes';
import { formatCount, formatMonthRange, formatQuantity } from '@/lib/format';
import { LOG_FIELD_NAMES, LOG_FIELDS, type LogField, type MonthEntry } from '@/lib/site-log/schema';

/** A year is what one looks at; what lies before is one press away, and counts in the totals all the same. */
const SHOWN_MONTHS = 12;

export interface Correcting {
  month: string;
  wished?: Partial<Record<LogField, number>>;
}

interface LedgerProps {
  state: MonthSheetState;
  code: string;
  /** On a phone: newest first, upright heads, and no cells to type into. */
  compact: boolean;
  correcting: Correcting | null;
  onCorrect: (correcting: Correcting | null) => void;
}

export function Ledger({ state, code, compact, correcting, onCorrect }: LedgerProps) {
  const [showsAll, setShowsAll] = useState(false);
  const { months, site, mayLog } = state.sheet;
  const hidden = showsAll ? 0 : Math.max(0, months.length - SHOWN_MONTHS);
  const shown = months.slice(hidden);
  const ordered = compact ? shown.toReversed() : shown;
  const reported = months.filter((entry) => entry.state === 'reported').length;
  const earlier = hidden > 0 && (
    <Button variant="second" size="small" className={compact ? 'mt-3' : 'mb-3'} onClick={() => setShowsAll(true)}>
      Show {formatMonthRange(months[0]!.month, months[hidden - 1]!.month)}
    </Button>
  );
  return (
    <>
      {!compact && earlier}
      <div className="relative overflow-x-auto">
        <table className={joinClasses('w-full border-collapse border-t border-ink', compact && 'table-fixed')}>
          <caption className="sr-only">Site {site.code}, month by month</caption>
          <LedgerHead compact={compact} mayLog={mayLog} />
          <tbody>
            {ordered.map((entry) => (
              <LedgerRow key={entry.month} {...{ state, code, compact, correcting, onCorrect, entry }} />
            ))}
          </tbody>
          <tfoot>
            <tr className="h-[42px] rule-double-t border-b border-b-ink">
              <th
                scope="row"
                className="px-3 text-left whitespace-nowrap max-md:px-0 max-md:text-13 max-md:whitespace-normal"
              >
                Since opening
              </th>
              {LOG_FIELDS.map((field) => (
                <td key={field} className={joinClasses(figureEdge(field), 'font-600')}>
                  {formatCount(state.totals[field])}
                </td>
              ))}
              {!compact && (
                <td className={joinClasses('px-3 text-13 text-ink-soft', LEDGER_EDGE)}>
                  {reported} of {formatQuantity(months.length, 'month')}
                </td>
              )}
              {mayLog && <td />}
            </tr>
          </tfoot>
        </table>
      </div>
      {compact && earlier}
    </>
  );
}

function LedgerHead({ compact, mayLog }: { compact: boolean; mayLog: boolean }) {
  const head = 'bg-paper-sunk text-13 font-600 text-ink-soft max-md:bg-paper';
  return (
    <thead>
      <tr className="h-[38px] border-b border-ink max-md:h-[100px] max-md:align-bottom">
        <th scope="col" className={joinClasses(head, 'px-3 text-left max-md:w-[92px] max-md:px-0 max-md:pb-1.5')}>
          Month
        </th>
        {LOG_FIELDS.map((field) => (
          <th
            key={field}
            scope="col"
            className={joinClasses(
              head,
              FIGURE_CELL,
              field === LOG_FIELDS[0] && LEDGER_EDGE,
              'max-md:border-l-0 max-md:pb-1.5',
            )}
          >
            {compact ? (
              <span className="inline-block rotate-180 [writing-mode:vertical-rl]">{LOG_FIELD_NAMES[field]}</span>
            ) : (
              LOG_FIELD_NAMES[field]
            )}
          </th>
        ))}
        {!compact && (
          <th scope="col" className={joinClasses(head, 'px-3 text-left', LEDGER_EDGE)}>
            Logged
          </th>
        )}
        {mayLog && (
          <th scope="col" className={joinClasses(head, 'w-11')}>
            <span className="sr-only">Correct</span>
          </th>
        )}
      </tr>
    </thead>
  );
}

function LedgerRow({ state, code, compact, correcting, onCorrect, entry }: LedgerProps & { entry: MonthEntry }) {
  const isOpen = state.openMonths.includes(entry.month);
  const begin = state.sheet.mayLog && entry.state !== 'missing' ? () => onCorrect({ month: entry.month }) : null;
  if (correcting?.month === entry.month) {
    return (
      <CorrectionRows
        code={code}
        site={state.sheet.site.code}
        entry={entry}
        wished={correcting.wished}
        compact={compact}
        onClose={() => onCorrect(null)}
      />
    );
  }
  if (isOpen && !compact) return <OpenRow state={state} entry={entry} onCorrect={begin} />;
  if (entry.state === 'missing') return <GapRow state={state} entry={entry} compact={compact} />;
  return <SavedRow state={state} entry={entry} compact={compact} onCorrect={begin} />;
}
