import { whyMissing, type MissingValue } from './lock-answers';
import type { ShotSlot } from './shot-detail';
import { STATE_WORDS, type RowState } from './states';

/** One key for each part of each copy in each shot. */
export const slotKey = (slot: ShotSlot): string => `${slot.shot} ${slot.asset} ${slot.copy ?? ''} ${slot.part}`;

/** State that a part has in a shot: locked, out of date, or what its value is while nothing is locked. */
export function slotState(slot: ShotSlot): RowState {
  if (slot.lock !== null) return slot.outdated === null ? 'locked' : 'outdated';
  return slot.override?.state ?? slot.current?.state ?? 'unset';
}

/** A part without a lock, as the report of missing parts tells it. */
export function missingOf(slot: ShotSlot): MissingValue {
  return { shot: slot.shot, asset: slot.asset, part: slot.part, copy: slot.copy ?? '', state: slot.current?.state ?? 'unset', override: slot.override !== null };
}

/** What a part without a lock waits for, where its state does not say it already. */
export function waitsFor(slot: ShotSlot): string {
  if (slot.ready_value_id !== null) return 'missing, ready to lock';
  const why = whyMissing(missingOf(slot));
  return why === STATE_WORDS[slotState(slot)] ? 'missing' : `missing, ${why}`;
}

/** Whether the chosen parts can be locked, unlocked or re-locked. */
export function slotActs(slots: readonly ShotSlot[]) {
  return {
    lockable: slots.filter((slot) => slot.lock === null && slot.ready_value_id !== null),
    locked: slots.filter((slot) => slot.lock !== null),
    outdated: slots.flatMap((slot) => slot.outdated ?? []),
    relockable: slots.filter((slot) => slot.outdated?.current?.value_id).length,
  };
}
