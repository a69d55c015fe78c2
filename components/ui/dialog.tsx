'use client';

import { Dialog as Radix } from 'radix-ui';
import { useRef, type ReactNode } from 'react';

export interface DialogProps {
  open: boolean;
  onOpenChange: (open: boolean) => void;
  title: ReactNode;
  /** What happens, in a sentence or two. */
  description?: ReactNode;
  children?: ReactNode;
  /** The buttons: the verb first, the way back second. */
  actions?: ReactNode;
  /** What opens it, where that is not elsewhere. */
  trigger?: ReactNode;
}

/** A sheet laid over the page, edged in ink. Escape leaves it; the focus goes back to where it came from. */
export function Dialog({ open, onOpenChange, title, description, children, actions, trigger }: DialogProps) {
  const cameFrom = useRef<Element | null>(null);
  return (
    <Radix.Root open={open} onOpenChange={onOpenChange}>
      {trigger && <Radix.Trigger asChild>{trigger}</Radix.Trigger>}
      <Radix.Portal>
        <Radix.Overlay className="fixed inset-0 z-40 bg-paper-sunk/80" />
        <Radix.Content
          {...(description ? {} : { 'aria-describedby': undefined })}
          onOpenAutoFocus={() => {
            cameFrom.current = document.activeElement;
          }}
          onCloseAutoFocus={(event) => {
            if (trigger || !(cameFrom.current instanceof HTMLElement)) return;
            event.preventDefault();
            cameFrom.current.focus();
          }}
          className="fixed top-1/2 left-1/2 z-50 max-h-[90dvh] w-[min(560px,calc(100vw-32px))] -translate-x-1/2 -translate-y-1/2 overflow-y-auto border border-ink bg-paper p-5"
        >
          <Radix.Title className="font-title text-24 font-500">{title}</Radix.Title>
          {description && <Radix.Description className="mt-2">{description}</Radix.Description>}
          {children && <div className="mt-3">{children}</div>}
          {actions && <div className="mt-5 flex flex-wrap gap-3">{actions}</div>}
        </Radix.Content>
      </Radix.Portal>
    </Radix.Root>
  );
}
