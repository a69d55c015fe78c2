import type { ComponentProps } from 'react';
import { CONTROL_LOOK, Field, type FieldText } from '@/components/ui/field';
import { joinClasses } from '@/components/ui/join-classes';

export interface SelectFieldProps extends FieldText, ComponentProps<'select'> {
  /** The choices; leave out and give `<option>`s as children where they need groups. */
  options?: readonly { value: string; label: string; disabled?: boolean }[];
  fieldClassName?: string;
}

/** The browser's own list: it knows keyboards, thumbs and screen readers better than a drawn one. */
export function SelectField(props: SelectFieldProps) {
  const { label, hint, error, labelHidden, id, options, className, fieldClassName, children, ...rest } = props;
  return (
    <Field id={id} label={label} hint={hint} error={error} labelHidden={labelHidden} className={fieldClassName}>
      {(wiring) => (
        <select {...rest} {...wiring} className={joinClasses(CONTROL_LOOK, className)}>
          {options?.map((option) => (
            <option key={option.value} value={option.value} disabled={option.disabled}>
              {option.label}
            </option>
          ))}
          {children}
        </select>
      )}
    </Field>
  );
}
