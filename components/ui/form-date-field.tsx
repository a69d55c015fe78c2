'use client';

import { useController, type Control, type FieldPath, type FieldValues } from 'react-hook-form';
import { DateField, type DateFieldProps } from '@/components/ui/date-field';

interface FormDateFieldProps<Values extends FieldValues> extends Omit<
  DateFieldProps,
  'value' | 'onChange' | 'onBlur' | 'name' | 'ref' | 'error'
> {
  control: Control<Values>;
  name: FieldPath<Values>;
}

/** A date field tied to a form by name; its value in the form is the ISO date. */
export function FormDateField<Values extends FieldValues>({ control, name, ...rest }: FormDateFieldProps<Values>) {
  const {
    field: { ref, name: fieldName, value, onChange, onBlur },
    fieldState,
  } = useController({ control, name });
  return (
    <DateField
      {...rest}
      name={fieldName}
      ref={ref}
      value={String(value ?? '')}
      onChange={onChange}
      onBlur={onBlur}
      error={fieldState.error?.message}
    />
  );
}
