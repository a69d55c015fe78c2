import { useId, type ComponentProps } from 'react';
import type { FieldText } from '@/components/ui/field';
import { joinClasses } from '@/components/ui/join-classes';

export interface CheckboxProps extends Omit<FieldText, 'labelHidden'>, Omit<ComponentProps<'input'>, 'type'> {
  /** `radio` for one of several under a shared name. */
  kind?: 'checkbox' | 'radio';
}

export function Checkbox({ kind = 'checkbox', label, hint, error, id: givenId, className, ...input }: CheckboxProps) {
  const ownId = useId();
  const id = givenId ?? ownId;
  const described = joinClasses(Boolean(error) && `${id}-error`, Boolean(hint) && `${id}-hint`);
  return (
    <div className={joinClasses('grid grid-cols-[20px_1fr] gap-x-2', className)}>
      <input
        {...input}
        type={kind}
        id={id}
        aria-describedby={described || undefined}
        aria-invalid={error ? true : undefined}
        className="mt-0.5 size-[18px] accent-ink"
      />
      <label htmlFor={id} className="text-15">
        {label}
      </label>
      {error && (
        <p id={`${id}-error`} className="col-start-2 text-13 text-stop">
          {error}
        </p>
      )}
      {hint && (
        <p id={`${id}-hint`} className="col-start-2 text-13 text-ink-soft">
          {hint}
        </p>
      )}
    </div>
  );
}
