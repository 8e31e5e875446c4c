'use client';

import { ReasonForm } from '@/components/forms/reason-form';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import type { Refusal } from '@/hooks/use-act';
import type { OutdatedLock } from '@/lib/rules/outdated-lock';
import { counted } from '@/lib/rules/shot-words';
import type { LinearUnit } from '@/lib/rules/units';
import { DifferenceTable } from './difference-table';

interface RelockDialogProps {
  /** The locks that were chosen; those without an approved new value stay as they are. Null keeps the dialog shut. */
  locks: readonly OutdatedLock[] | null;
  unit: LinearUnit;
  busy: boolean;
  refusal: Refusal | null;
  onRelock: (items: { lock: string; value_id: string }[], reason: string) => void;
  onClose: () => void;
}

/** Shows every difference, then moves the locks to the values that are approved now. */
export function RelockDialog({ locks, unit, busy, refusal, onRelock, onClose }: RelockDialogProps) {
  if (locks === null || locks.length === 0) return null;
  const ready = locks.filter((lock) => lock.current?.value_id);
  const waiting = locks.filter((lock) => !lock.current?.value_id);
  const shots = new Set(ready.map((lock) => lock.shot)).size;

  const left =
    waiting.length === 0 ? null : (
      <p className="text-13 text-ink-2">
        {counted(waiting.length, 'part')} {waiting.length === 1 ? 'stays' : 'stay'} as locked, without an approved new value: {waiting.slice(0, 6).map((lock) => `${lock.asset} ${lock.part ?? lock.body ?? ''} in ${lock.shot}`).join(', ')}
        {waiting.length > 6 ? ` and ${waiting.length - 6} more` : ''}.
      </p>
    );

  return (
    <Dialog
      open
      onOpenChange={(open) => !open && onClose()}
      title={ready.length === 0 ? 'Nothing to re-lock yet' : `Re-lock ${counted(ready.length, 'part')} in ${counted(shots, 'shot')}`}
      description={ready.length === 0 ? 'None of the new values is approved.' : 'From the locked value to the one that is approved now.'}
      className="sm:w-[min(68rem,calc(100vw-4rem))]"
    >
      {ready.length === 0 ? (
        <div className="flex flex-col gap-4">
          {left}
          <Button look="quiet" className="self-end" onClick={onClose}>
            Keep as locked
          </Button>
        </div>
      ) : (
        <ReasonForm
          act={`Re-lock ${counted(ready.length, 'part')}`}
          acting="Re-locking"
          keep="Keep as locked"
          busy={busy}
          refusal={refusal}
          onSend={(reason) => onRelock(ready.flatMap(({ lock, current }) => (current?.value_id ? [{ lock, value_id: current.value_id }] : [])), reason)}
          onClose={onClose}
        >
          <DifferenceTable locks={ready} unit={unit} />
          {left}
        </ReasonForm>
      )}
    </Dialog>
  );
}
