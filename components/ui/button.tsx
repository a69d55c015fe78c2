'use client';

import type { ComponentProps } from 'react';
import { buttonLook, type ButtonSize, type ButtonVariant } from '@/components/ui/button-look';

export interface ButtonProps extends ComponentProps<'button'> {
  variant?: ButtonVariant;
  size?: ButtonSize;
  /** At work: the button stays where it is, keeps its focus and takes no second press. */
  pending?: boolean;
  /** What it says meanwhile, e.g. "Publishing 2 of 6". */
  pendingLabel?: string;
}

export function Button({
  variant,
  size,
  pending = false,
  pendingLabel,
  className,
  children,
  onClick,
  ...rest
}: ButtonProps) {
  return (
    <button
      type="button"
      {...rest}
      aria-disabled={pending || undefined}
      aria-busy={pending || undefined}
      className={buttonLook(variant, size, className)}
      onClick={(event) => {
        if (pending) event.preventDefault();
        else onClick?.(event);
      }}
    >
      {pending ? (pendingLabel ?? children) : children}
      {pending && (
        <span aria-hidden="true" className="motion-safe:animate-pulse">
          …
        </span>
      )}
    </button>
  );
}
