import { cellMark, moveBetweenCells } from '@/components/site-log/cell-keys';
import type { MonthSheetState } from '@/components/site-log/use-month-sheet';
import { cellKey } from '@/components/site-log/sheet-figures';
import { CONTROL_LOOK } from '@/components/ui/field';
import { joinClasses } from '@/components/ui/join-classes';
import { formatLongMonth } from '@/lib/format';
import { LOG_FIELD_NAMES, type LogField } from '@/lib/site-log/schema';

interface CellInputProps {
  state: MonthSheetState;
  month: string;
  field: LogField;
  /** Set where a drawn label names the cell; otherwise it names itself. */
  id?: string;
  className?: string;
}

export const faultId = (month: string, field: LogField): string => `fault-${month}-${field}`;

/** One cell of the open row. Text, not a number box: what can't be read is shown and said, not swallowed. */
export function CellInput({ state, month, field, id, className }: CellInputProps) {
  const fault = state.faults[cellKey(month, field)];
  return (
    <input
      {...cellMark(month, field)}
      id={id}
      type="text"
      inputMode="numeric"
      autoComplete="off"
      aria-label={id ? undefined : `${LOG_FIELD_NAMES[field]} in ${formatLongMonth(month)}`}
      aria-invalid={fault ? true : undefined}
      aria-describedby={fault ? faultId(month, field) : undefined}
      value={state.typed[month]?.[field] ?? ''}
      onChange={(event) => state.type(month, field, event.target.value)}
      onKeyDown={moveBetweenCells}
      onFocus={(event) => event.currentTarget.select()}
      onPaste={(event) => {
        if (state.paste(month, field, event.clipboardData.getData('text'))) event.preventDefault();
      }}
      className={joinClasses(CONTROL_LOOK, 'text-right focus-visible:outline-offset-0', className)}
    />
  );
}
