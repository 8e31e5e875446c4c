'use client';

import { useState, type ReactNode, type SubmitEvent } from 'react';
import { Button } from '@/components/ui/button';
import type { Refusal } from '@/hooks/use-act';
import { ActRefusal } from './act-refusal';
import { ReasonField } from './reason-field';

interface ReasonFormProps {
  /** What the act concerns, above the reason. */
  children?: ReactNode;
  hint?: string;
  /** The act on its button, as it waits and as it runs. */
  act: string;
  acting: string;
  /** What leaving it comes to. */
  keep: string;
  busy: boolean;
  refusal: Refusal | null;
  onSend: (reason: string) => void;
  onClose: () => void;
}

/** An act that needs its reason: it is sent only with one, and what was typed stays while it is refused. */
export function ReasonForm({ children, hint, act, acting, keep, busy, refusal, onSend, onClose }: ReasonFormProps) {
  const [reason, setReason] = useState('');
  const [missing, setMissing] = useState(false);

  function submit(event: SubmitEvent<HTMLFormElement>) {
    event.preventDefault();
    if (reason.trim() === '') return setMissing(true);
    onSend(reason.trim());
  }

  return (
    <form onSubmit={submit} noValidate className="flex flex-col gap-4">
      {children}
      <ReasonField
        value={reason}
        missing={missing}
        hint={hint}
        onChange={(value) => {
          setReason(value);
          setMissing(false);
        }}
      />
      <ActRefusal refusal={refusal} />
      <div className="flex justify-end gap-2">
        <Button look="quiet" onClick={onClose}>
          {keep}
        </Button>
        <Button type="submit" look="filled" disabled={busy}>
          {busy ? acting : act}
        </Button>
      </div>
    </form>
  );
}
