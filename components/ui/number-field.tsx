import type { ComponentProps, ReactNode } from 'react';
import { Field, type FieldText } from '@/components/ui/field';
import { joinClasses } from '@/components/ui/join-classes';

export interface NumberFieldProps extends FieldText, Omit<ComponentProps<'input'>, 'type'> {
  /** Stands inside the box after the figure: "a month", "%", "patients". */
  unit?: ReactNode;
  /** Whole numbers get the keypad without a decimal sign. */
  whole?: boolean;
  fieldClassName?: string;
}

/**
 * A figure with its unit. A text box on purpose: a browser's number box swallows what it cannot read and turns figures
 * under the mouse wheel. With react-hook-form: `register('rate', { setValueAs: numberTyped })`.
 */
export function NumberField({
  label,
  hint,
  error,
  labelHidden,
  id,
  unit,
  whole = false,
  className,
  fieldClassName,
  ...input
}: NumberFieldProps) {
  return (
    <Field id={id} label={label} hint={hint} error={error} labelHidden={labelHidden} className={fieldClassName}>
      {(wiring) => (
        <span
          className={joinClasses(
            'flex rounded border border-rule-strong bg-paper has-[input:disabled]:bg-paper-sunk has-[input[readonly]]:bg-paper-sunk',
            'has-[:focus-visible]:outline-2 has-[:focus-visible]:outline-offset-2 has-[:focus-visible]:outline-ink',
            wiring['aria-invalid'] && 'border-stop outline outline-stop',
          )}
        >
          <input
            type="text"
            inputMode={whole ? 'numeric' : 'decimal'}
            autoComplete="off"
            {...input}
            {...wiring}
            className={joinClasses(
              'min-h-[42px] w-full min-w-0 flex-1 bg-transparent px-2.5 py-2 text-right text-18 outline-none md:min-h-[38px] md:text-15',
              className,
            )}
          />
          {unit && <span className="flex-none self-center pr-2.5 text-13 whitespace-nowrap text-ink-soft">{unit}</span>}
        </span>
      )}
    </Field>
  );
}
