'use client';

import { ReasonForm } from '@/components/forms/reason-form';
import { Dialog } from '@/components/ui/dialog';
import type { Refusal } from '@/hooks/use-act';
import type { ShotSlot } from '@/lib/rules/shot-detail';

interface DropOverrideDialogProps {
  slot: ShotSlot | null;
  busy: boolean;
  refusal: Refusal | null;
  onDrop: (slot: ShotSlot, reason: string) => void;
  onClose: () => void;
}

/** Ends an override; a lock that holds its value stands until somebody unlocks it. */
export function DropOverrideDialog({ slot, busy, refusal, onDrop, onClose }: DropOverrideDialogProps) {
  if (slot === null) return null;

  return (
    <Dialog
      open
      onOpenChange={(open) => !open && onClose()}
      title={`Drop the override of ${slot.asset} ${slot.part}`}
      description={slot.lock?.of_override ? `${slot.shot} stays locked to the override’s value and is out of date until it is re-locked.` : `${slot.shot} takes the part’s own value again.`}
    >
      <ReasonForm act="Drop override" acting="Dropping" keep="Keep it" busy={busy} refusal={refusal} onSend={(reason) => onDrop(slot, reason)} onClose={onClose} />
    </Dialog>
  );
}
