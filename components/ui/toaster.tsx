'use client';

import { Toaster as Sonner, toast } from 'sonner';

/** Short lines at the foot of the page that say what was done; what needs reading stands in the page itself. */
export function Toaster() {
  return (
    <Sonner
      position="bottom-left"
      duration={6000}
      toastOptions={{
        unstyled: true,
        classNames: {
          toast:
            'flex w-[356px] max-w-full items-center gap-3 rounded border border-ink bg-paper px-5 py-3 font-text text-15 text-ink',
          title: 'font-400',
          description: 'text-13 text-ink-soft',
          actionButton: 'ml-auto text-13 underline underline-offset-3',
          error: 'border-stop text-stop',
        },
      }}
    />
  );
}

export function sayDone(message: string): void {
  toast(message);
}

export function sayStopped(message: string): void {
  toast.error(message);
}
