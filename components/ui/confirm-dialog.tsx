'use client';

import type { ReactNode } from 'react';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';

export interface ConfirmDialogProps {
  open: boolean;
  onOpenChange: (open: boolean) => void;
  /** A question that names what it is about: "Publish to 6 readers?" */
  title: ReactNode;
  description: ReactNode;
  children?: ReactNode;
  /** The verb of the act, as on the button that led here. */
  verb: string;
  wayBack?: string;
  danger?: boolean;
  pending?: boolean;
  onConfirm: () => void;
}

/** Asked once, only where something leaves the building or cannot be undone. */
export function ConfirmDialog(props: ConfirmDialogProps) {
  const { verb, wayBack = 'Go back', danger = false, pending = false, onConfirm, onOpenChange, ...rest } = props;
  return (
    <Dialog
      {...rest}
      onOpenChange={onOpenChange}
      actions={
        <>
          <Button variant={danger ? 'danger' : 'primary'} pending={pending} onClick={onConfirm}>
            {verb}
          </Button>
          <Button variant="second" onClick={() => onOpenChange(false)}>
            {wayBack}
          </Button>
        </>
      }
    />
  );
}
