import type { ComponentProps } from 'react';
import { CONTROL_LOOK, Field, type FieldText } from '@/components/ui/field';
import { joinClasses } from '@/components/ui/join-classes';

export interface TextFieldProps extends FieldText, ComponentProps<'input'> {
  fieldClassName?: string;
}

export function TextField({
  label,
  hint,
  error,
  labelHidden,
  id,
  className,
  fieldClassName,
  ...input
}: TextFieldProps) {
  return (
    <Field id={id} label={label} hint={hint} error={error} labelHidden={labelHidden} className={fieldClassName}>
      {(wiring) => <input type="text" {...input} {...wiring} className={joinClasses(CONTROL_LOOK, className)} />}
    </Field>
  );
}
