import { useId, type ReactNode } from 'react';
import { joinClasses } from '@/components/ui/join-classes';

export interface FieldText {
  label: ReactNode;
  hint?: ReactNode;
  /** What is wrong and what would be right; null or absent where nothing is. */
  error?: ReactNode;
  /** The label is read out but not drawn, where a table head already says it. */
  labelHidden?: boolean;
}

export interface FieldWiring {
  id: string;
  'aria-describedby': string | undefined;
  'aria-invalid': true | undefined;
}

interface FieldProps extends FieldText {
  id?: string;
  className?: string;
  children: (wiring: FieldWiring) => ReactNode;
}

/** A label over a control, with its hint and its error tied to it for those who hear the page. */
export function Field({ id: givenId, label, hint, error, labelHidden = false, className, children }: FieldProps) {
  const ownId = useId();
  const id = givenId ?? ownId;
  const hintId = `${id}-hint`;
  const errorId = `${id}-error`;
  const described = joinClasses(Boolean(error) && errorId, Boolean(hint) && hintId);
  return (
    <div className={className}>
      <label htmlFor={id} className={labelHidden ? 'sr-only' : 'mb-1 block text-13 font-600'}>
        {label}
      </label>
      {children({ id, 'aria-describedby': described || undefined, 'aria-invalid': error ? true : undefined })}
      {error && (
        <p id={errorId} className="mt-1 text-13 text-stop">
          {error}
        </p>
      )}
      {hint && (
        <p id={hintId} className="mt-1 text-13 text-ink-soft">
          {hint}
        </p>
      )}
    </div>
  );
}

/** The look of every box that takes typing: 40 px high, 44 px with larger type under a thumb; a wrong one is edged twice as thick. */
export const CONTROL_LOOK =
  'block w-full min-h-11 rounded border border-rule-strong bg-paper px-2.5 py-2 text-18 text-ink md:min-h-10 md:text-15 ' +
  'aria-invalid:border-stop aria-invalid:outline aria-invalid:outline-stop aria-invalid:focus-visible:outline-2 aria-invalid:focus-visible:outline-ink ' +
  'disabled:cursor-not-allowed disabled:bg-paper-sunk disabled:text-ink-soft [&[readonly]]:bg-paper-sunk';
