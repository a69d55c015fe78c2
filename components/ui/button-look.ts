import { joinClasses } from '@/components/ui/join-classes';

export type ButtonVariant = 'primary' | 'second' | 'quiet' | 'danger';
export type ButtonSize = 'normal' | 'small';

const VARIANTS: Record<ButtonVariant, string> = {
  primary: 'border-ink bg-ink font-600 text-paper',
  second: 'border-rule-strong bg-transparent text-ink hover:border-ink',
  quiet:
    'border-transparent bg-transparent text-ink underline decoration-rule-strong underline-offset-3 hover:decoration-current',
  danger: 'border-stop bg-stop font-600 text-paper',
};

const SIZES: Record<ButtonSize, string> = {
  normal: 'min-h-11 px-5 py-2 text-15 md:min-h-10',
  small: 'min-h-11 px-3 py-1 text-13 md:min-h-8',
};

/** One look for a button and for a link that leads to an action. */
export function buttonLook(
  variant: ButtonVariant = 'primary',
  size: ButtonSize = 'normal',
  className?: string,
): string {
  return joinClasses(
    'inline-flex items-center justify-center gap-2 rounded border whitespace-nowrap no-underline select-none screen-only',
    'disabled:cursor-not-allowed disabled:border-rule-strong disabled:bg-paper-sunk disabled:text-ink-soft',
    VARIANTS[variant],
    SIZES[size],
    className,
  );
}
