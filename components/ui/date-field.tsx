'use client';

import { useState, type Ref } from 'react';
import { CONTROL_LOOK, Field, type FieldText } from '@/components/ui/field';
import { joinClasses } from '@/components/ui/join-classes';
import { readTypedDate } from '@/components/ui/typed-date';
import { formatDate } from '@/lib/format';

export interface DateFieldProps extends FieldText {
  /** ISO date, or empty. While what is typed is no date yet, it is handed on as typed, so that a schema refuses it. */
  value: string;
  onChange: (value: string) => void;
  onBlur?: () => void;
  name?: string;
  id?: string;
  ref?: Ref<HTMLInputElement>;
  disabled?: boolean;
  readOnly?: boolean;
  required?: boolean;
  placeholder?: string;
  className?: string;
  fieldClassName?: string;
}

function printed(value: string): string {
  const read = readTypedDate(value);
  return read.kind === 'date' ? formatDate(read.iso) : value;
}

/** A day typed as `14 Mar 2027` or `2027-03-14`. One that reads two ways is asked back, never guessed. */
export function DateField(props: DateFieldProps) {
  const { label, hint, error, labelHidden, id, value, onChange, onBlur, className, fieldClassName, ...input } = props;
  const [draft, setDraft] = useState<string | null>(null);
  const text = draft ?? printed(value);
  const read = readTypedDate(text);
  const settled = draft === null;

  const settle = (): void => {
    if (read.kind !== 'ambiguous') setDraft(null);
    onBlur?.();
  };
  const choose = (iso: string): void => {
    setDraft(null);
    onChange(iso);
  };
  const unreadable = settled && read.kind === 'unreadable' ? 'Not a date. Type it like 14 Mar 2027.' : null;
  const question = read.kind === 'ambiguous' && (
    <>
      Which is meant:{' '}
      {read.readings.map((iso, place) => (
        <span key={iso}>
          {place === 1 && ' or '}
          <button
            type="button"
            disabled={input.disabled}
            className="underline decoration-1 underline-offset-3"
            onClick={() => choose(iso)}
          >
            {formatDate(iso)}
          </button>
        </span>
      ))}
      ?
    </>
  );

  return (
    <Field
      id={id}
      label={label}
      hint={hint}
      error={question || error || unreadable}
      labelHidden={labelHidden}
      className={fieldClassName}
    >
      {(wiring) => (
        <input
          type="text"
          autoComplete="off"
          placeholder="14 Mar 2027"
          {...input}
          {...wiring}
          value={text}
          onChange={(event) => {
            const typed = readTypedDate(event.target.value);
            setDraft(event.target.value);
            onChange(typed.kind === 'date' ? typed.iso : event.target.value.trim());
          }}
          onBlur={settle}
          className={joinClasses(CONTROL_LOOK, className)}
        />
      )}
    </Field>
  );
}
