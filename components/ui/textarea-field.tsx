import type { ComponentProps } from 'react';
import { CONTROL_LOOK, Field, type FieldText } from '@/components/ui/field';
import { joinClasses } from '@/components/ui/join-classes';

export interface TextareaFieldProps extends FieldText, ComponentProps<'textarea'> {
  fieldClassName?: string;
}

export function TextareaField({
  label,
  hint,
  error,
  labelHidden,
  id,
  className,
  fieldClassName,
  ...rest
}: TextareaFieldProps) {
  return (
    <Field id={id} label={label} hint={hint} error={error} labelHidden={labelHidden} className={fieldClassName}>
      {(wiring) => (
        <textarea rows={4} {...rest} {...wiring} className={joinClasses(CONTROL_LOOK, 'resize-y', className)} />
      )}
    </Field>
  );
}
