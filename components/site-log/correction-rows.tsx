'use client';

import { PencilIcon } from '@/components/site-log/sheet-icons';
import { type CorrectionState, useCorrection } from '@/components/site-log/use-correction';
import { Button } from '@/components/ui/button';
import { CONTROL_LOOK } from '@/components/ui/field';
import { joinClasses } from '@/components/ui/join-classes';
import { NumberField } from '@/components/ui/number-field';
import { SelectField } from '@/components/ui/select-field';
import { TextareaField } from '@/components/ui/textarea-field';
import { formatLongMonth, formatMonth } from '@/lib/format';
import {
  CORRECTION_REASON_NAMES,
  CORRECTION_REASONS,
  LOG_FIELD_NAMES,
  LOG_FIELDS,
  type CorrectionReason,
  type LogField,
  type MonthEntry,
} from '@/lib/site-log/schema';

interface CorrectionRowsProps {
  code: string;
  site: string;
  entry: MonthEntry;
  wished?: Partial<Record<LogField, number>>;
  /** On a phone the figures stand in the panel, not in the row. */
  compact: boolean;
  onClose: () => void;
}

/** A saved month opened under itself: the figures, the reason, and the way back. Escape leaves it. */
export function CorrectionRows({ code, site, entry, wished, compact, onClose }: CorrectionRowsProps) {
  const correction = useCorrection({ code, site, entry, wished, onDone: onClose });
  const leave = (event: { key: string }): void => {
    if (event.key === 'Escape') onClose();
  };
  return (
    <>
      <tr className="bg-paper-sunk" onKeyDown={leave}>
        <th scope="row" className="px-3 text-left font-400 whitespace-nowrap max-md:px-0">
          {formatMonth(entry.month)}
        </th>
        {LOG_FIELDS.map((field) => (
          <td
            key={field}
            className="border-l border-rule py-1 pr-1 text-right whitespace-nowrap first-of-type:border-l-[3px] first-of-type:border-double first-of-type:border-rule-strong max-md:pr-2 max-md:first-of-type:border-l"
          >
            {entry[field] !== null && (
              <CorrectedCell correction={correction} entry={entry} field={field} compact={compact} />
            )}
          </td>
        ))}
        {!compact && (
          <td className="border-l-[3px] border-double border-rule-strong px-3 text-13 text-ink-soft">correcting</td>
        )}
        <td className="w-11 text-center">
          <button
            type="button"
            aria-expanded="true"
            onClick={onClose}
            className="inline-grid h-11 w-11 place-items-center bg-ink text-paper md:h-9"
          >
            <PencilIcon />
            <span className="sr-only">Leave {formatLongMonth(entry.month)} as it was</span>
          </button>
        </td>
      </tr>
      <tr className="border-b border-rule bg-paper-sunk" onKeyDown={leave}>
        {!compact && <td />}
        <td colSpan={7} className="px-0 pt-1 pb-4 md:pr-3">
          <CorrectionPanel correction={correction} entry={entry} compact={compact} onClose={onClose} />
        </td>
      </tr>
    </>
  );
}

interface PartProps {
  correction: CorrectionState;
  entry: MonthEntry;
  compact: boolean;
}

function CorrectedCell({ correction, entry, field, compact }: PartProps & { field: LogField }) {
  const isChanged = correction.changed.includes(field);
  const old = isChanged && <s className="mr-1.5 text-ink-soft">{entry[field]}</s>;
  if (compact)
    return isChanged ? (
      <span>
        {old}
        <b>{correction.texts[field] || '–'}</b>
      </span>
    ) : (
      entry[field]
    );
  return (
    <span className="flex items-center justify-end">
      {old}
      <input
        type="text"
        inputMode="numeric"
        autoComplete="off"
        autoFocus={correction.saved[0] === field}
        aria-label={`${LOG_FIELD_NAMES[field]} in ${formatLongMonth(entry.month)}`}
        aria-invalid={correction.faults[field] ? true : undefined}
        aria-describedby={correction.faults[field] ? `correction-${field}` : undefined}
        value={correction.texts[field] ?? ''}
        onChange={(event) => correction.setText(field, event.target.value)}
        className={joinClasses(CONTROL_LOOK, 'max-w-14 text-right md:min-h-8 md:py-0.5')}
      />
    </span>
  );
}

/** `Why does January 2027 change from 4 to 3 randomised?` */
function question({ changed, texts }: CorrectionState, entry: MonthEntry): string {
  const changes = changed.map(
    (field) => `from ${entry[field]} to ${texts[field]?.trim() || 'empty'} ${LOG_FIELD_NAMES[field].toLowerCase()}`,
  );
  const month = formatLongMonth(entry.month);
  return changes.length === 0 ? `Why does ${month} change?` : `Why does ${month} change ${changes.join(', ')}?`;
}

function CorrectionPanel({ correction, entry, compact, onClose }: PartProps & { onClose: () => void }) {
  const { faults, saved } = correction;
  return (
    <form
      noValidate
      className="grid gap-3 md:max-w-[36rem]"
      onSubmit={(event) => {
        event.preventDefault();
        void correction.send();
      }}
    >
      {compact &&
        saved.map((field) => (
          <NumberField
            key={field}
            whole
            autoFocus={saved[0] === field}
            label={`${LOG_FIELD_NAMES[field]} in ${formatLongMonth(entry.month)}, was ${entry[field]}`}
            value={correction.texts[field] ?? ''}
            error={faults[field]}
            onChange={(event) => correction.setText(field, event.target.value)}
          />
        ))}
      {!compact &&
        saved.map((field) =>
          faults[field] ? (
            <p key={field} id={`correction-${field}`} className="text-13 text-stop">
              {LOG_FIELD_NAMES[field]}: {faults[field]}
            </p>
          ) : null,
        )}
      <SelectField
        label="Reason"
        value={correction.reasonKind}
        error={faults.reasonKind}
        onChange={(event) => correction.setReasonKind(event.target.value as CorrectionReason)}
        options={[
          { value: '', label: 'Choose' },
          ...CORRECTION_REASONS.map((value) => ({ value, label: CORRECTION_REASON_NAMES[value] })),
        ]}
      />
      <TextareaField
        label={question(correction, entry)}
        rows={2}
        maxLength={1000}
        value={correction.reason}
        error={faults.reason}
        hint="The old figure, the new one, your name, the time and this reason are kept for good."
        onChange={(event) => correction.setReason(event.target.value)}
      />
      {correction.stopped && Object.keys(faults).length === 0 && (
        <p role="alert" className="text-13 text-stop">
          {correction.stopped}
        </p>
      )}
      <div className="flex flex-wrap gap-2">
        <Button type="submit" size="small" pending={correction.pending} pendingLabel="Saving">
          Save correction
        </Button>
        <Button size="small" variant="second" onClick={onClose}>
          Leave as it was
        </Button>
      </div>
    </form>
  );
}
