'use client';

import { ReasonForm } from '@/components/forms/reason-form';
import { Dialog } from '@/components/ui/dialog';
import type { Refusal } from '@/hooks/use-act';
import type { ShotSlot } from '@/lib/rules/shot-detail';
import { assetInShot, counted } from '@/lib/rules/shot-words';

interface UnlockDialogProps {
  /** The locked parts that would be unlocked; null keeps the dialog shut. */
  slots: readonly ShotSlot[] | null;
  shot: string;
  busy: boolean;
  refusal: Refusal | null;
  onUnlock: (reason: string) => void;
  onClose: () => void;
}

/** Asks why, and says who took the rows that would be given up. */
export function UnlockDialog({ slots, shot, busy, refusal, onUnlock, onClose }: UnlockDialogProps) {
  if (slots === null || slots.length === 0) return null;
  const takers = [...new Set(slots.flatMap((slot) => slot.lock?.taken_by ?? []))].sort();

  return (
    <Dialog open onOpenChange={(open) => !open && onClose()} title={`Unlock ${slots.length === 1 ? `${slots[0].asset} ${slots[0].part}` : counted(slots.length, 'part')}`} description={`in ${shot}`}>
      <ReasonForm
        hint={takers.length === 0 ? undefined : 'Those who took the rows read it.'}
        act="Unlock"
        acting="Unlocking"
        keep="Keep locked"
        busy={busy}
        refusal={refusal}
        onSend={onUnlock}
        onClose={onClose}
      >
        {slots.length === 1 ? null : (
          <ul aria-label="Parts" tabIndex={0} className="max-h-40 overflow-y-auto border-y border-rule py-1 text-13 text-ink-2">
            {slots.map((slot) => (
              <li key={slot.lock?.id}>
                {assetInShot(slot.asset, slot.copy)} {slot.part} <span className="font-mono text-ink-3">{slot.lock?.version}</span>
              </li>
            ))}
          </ul>
        )}
        <p className="text-14">
          {takers.length === 0 ? 'Nobody has taken these rows yet.' : `Taken by ${takers.join(', ')}.`}
        </p>
      </ReasonForm>
    </Dialog>
  );
}
