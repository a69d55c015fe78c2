import Link from 'next/link';
import type { ComponentProps } from 'react';
import { buttonLook, type ButtonSize, type ButtonVariant } from '@/components/ui/button-look';

interface ButtonLinkProps extends ComponentProps<typeof Link> {
  variant?: ButtonVariant;
  size?: ButtonSize;
}

/** A link that looks like a button, where the action is to go somewhere. */
export function ButtonLink({ variant, size, className, ...rest }: ButtonLinkProps) {
  return <Link {...rest} className={buttonLook(variant, size, className)} />;
}
