'use client';

import { useState, type SubmitEvent } from 'react';
import { ActRefusal } from '@/components/forms/act-refusal';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { Field } from '@/components/ui/field';
import { Input } from '@/components/ui/input';
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
  const [reason, setReason] = useState('');
  const [missing, setMissing] = useState(false);
  if (slot === null) return null;

  function submit(event: SubmitEvent<HTMLFormElement>) {
    event.preventDefault();
    if (reason.trim() === '') return setMissing(true);
    if (slot !== null) onDrop(slot, reason.trim());
  }

  return (
    <Dialog
      open
      onOpenChange={(open) => !open && onClose()}
      title={`Drop the override of ${slot.asset} ${slot.part}`}
      description={slot.lock?.of_override ? `${slot.shot} stays locked to the override’s value and is out of date until it is re-locked.` : `${slot.shot} takes the part’s own value again.`}
    >
      <form onSubmit={submit} noValidate className="flex flex-col gap-4">
        <Field label="Reason" error={missing ? 'Say why.' : null}>
          <Input
            value={reason}
            maxLength={500}
            autoComplete="off"
            onChange={(event) => {
              setReason(event.target.value);
              setMissing(false);
            }}
          />
        </Field>
        <ActRefusal refusal={refusal} />
        <div className="flex justify-end gap-2">
          <Button look="quiet" onClick={onClose}>
            Keep it
          </Button>
          <Button type="submit" look="filled" disabled={busy}>
            {busy ? 'Dropping' : 'Drop override'}
          </Button>
        </div>
      </form>
    </Dialog>
  );
}
