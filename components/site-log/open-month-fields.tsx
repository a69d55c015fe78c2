'use client';

import { CellInput, faultId } from '@/components/site-log/cell-input';
import { cellKey } from '@/components/site-log/sheet-figures';
import type { MonthSheetState } from '@/components/site-log/use-month-sheet';
import { LOG_FIELD_NAMES, LOG_FIELDS, type LogField } from '@/lib/site-log/schema';

const LABELS: Record<LogField, string> = { ...LOG_FIELD_NAMES, failed: 'Failed screening' };

/** A phone's open month: five fields under each other, for a thumb. */
export function OpenMonthFields({ state, month }: { state: MonthSheetState; month: string }) {
  const entry = state.sheet.months.find((one) => one.month === month);
  return (
    <div className="mt-3 border-t border-ink">
      {LOG_FIELDS.map((field) => {
        const fault = state.faults[cellKey(month, field)];
        const saved = entry?.[field] ?? null;
        return (
          <div key={field} className="border-b border-rule py-1">
            <div className="grid min-h-11 grid-cols-[1fr_112px] items-center">
              {saved === null ? (
                <label htmlFor={`open-${field}`} className="text-18">
                  {LABELS[field]}
                </label>
              ) : (
                <span className="text-18">{LABELS[field]}</span>
              )}
              {saved === null ? (
                <CellInput state={state} month={month} field={field} id={`open-${field}`} />
              ) : (
                <span className="px-2.5 text-right text-18">{saved}</span>
              )}
            </div>
            {fault && (
              <p id={faultId(month, field)} className="pb-1 text-13 text-stop">
                {fault}
              </p>
            )}
          </div>
        );
      })}
    </div>
  );
}
