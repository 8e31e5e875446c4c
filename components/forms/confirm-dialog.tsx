'use client';

import type { ReactNode } from 'react';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';

interface ConfirmDialogProps {
  open: boolean;
  onOpenChange: (open: boolean) => void;
  title: string;
  /** The act in one word or two, on its button. */
  act: string;
  busy: boolean;
  onConfirm: () => void;
  children: ReactNode;
}

/** Asks once before an act that somebody else would notice. */
export function ConfirmDialog({ open, onOpenChange, title, act, busy, onConfirm, children }: ConfirmDialogProps) {
  return (
    <Dialog open={open} onOpenChange={onOpenChange} title={title} description={children}>
      <div className="flex justify-end gap-2">
        <Button look="quiet" onClick={() => onOpenChange(false)}>
          Leave it
        </Button>
        <Button look="filled" disabled={busy} onClick={onConfirm}>
          {act}
        </Button>
      </div>
    </Dialog>
  );
}
