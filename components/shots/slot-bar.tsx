import { Button } from '@/components/ui/button';
import type { ShotSlot } from '@/lib/rules/shot-detail';
import { counted } from '@/lib/rules/shot-words';
import { slotActs } from '@/lib/rules/shot-slots';

interface SlotBarProps {
  slots: readonly ShotSlot[];
  busy: boolean;
  onLock: (slots: readonly ShotSlot[]) => void;
  onUnlock: (slots: readonly ShotSlot[]) => void;
  onRelock: (slots: readonly ShotSlot[]) => void;
  onClear: () => void;
}

/** What can be done with the chosen parts. */
export function SlotBar({ slots, busy, onLock, onUnlock, onRelock, onClear }: SlotBarProps) {
  const { lockable, locked, outdated, relockable } = slotActs(slots);
  return (
    <div role="toolbar" aria-label="Chosen parts" className="sticky top-0 z-10 flex flex-wrap items-center gap-2 border-b border-rule bg-selected px-4 py-2 md:px-6">
      <p aria-live="polite" className="mr-2 text-14">
        {counted(slots.length, 'part')} chosen
      </p>
      {slots.length > locked.length ? (
        <Button size="small" disabled={busy || lockable.length === 0} onClick={() => onLock(slots)}>
          {lockable.length === 0 ? 'Nothing approved to lock' : `Lock ${lockable.length}`}
        </Button>
      ) : null}
      {outdated.length > 0 ? (
        <Button size="small" disabled={busy} onClick={() => onRelock(slots)}>
          {relockable === 0 ? 'See differences…' : `Re-lock ${relockable}…`}
        </Button>
      ) : null}
      {locked.length > 0 ? (
        <Button size="small" disabled={busy} onClick={() => onUnlock(slots)}>
          Unlock {locked.length}…
        </Button>
      ) : null}
      <Button size="small" look="quiet" className="ml-auto" onClick={onClear}>
        Clear
      </Button>
    </div>
  );
}
