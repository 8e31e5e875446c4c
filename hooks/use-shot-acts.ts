'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { toast } from 'sonner';
import type { ActionResult } from '@/lib/rules/action-result';
import type { DropOverrideInput } from '@/lib/rules/inputs/drop-override';
import type { LockShotsInput, LockValuesInput, RelockValuesInput, UnlockValuesInput } from '@/lib/rules/inputs/lock-values';
import type { PutShotsInput } from '@/lib/rules/inputs/put-shots';
import type { RemoveFromShotInput } from '@/lib/rules/inputs/remove-from-shot';
import type { SetValuesInput, SetValuesItem } from '@/lib/rules/inputs/set-values';
import type { LockShotsAnswer } from '@/lib/rules/lock-answers';
import type { OutdatedLock } from '@/lib/rules/outdated-lock';
import type { ShotDetail, ShotSlot } from '@/lib/rules/shot-detail';
import { counted } from '@/lib/rules/shot-words';
import { missingOf, slotActs } from '@/lib/rules/shot-slots';
import { useAct } from './use-act';

type Act<Input, Output = { items: unknown[] }> = (input: Input) => Promise<ActionResult<Output>>;

export interface ShotActions {
  put: Act<PutShotsInput>;
  remove: Act<RemoveFromShotInput, { asset: string; removed: number }>;
  lockShots: Act<LockShotsInput, LockShotsAnswer>;
  lockValues: Act<LockValuesInput>;
  unlock: Act<UnlockValuesInput>;
  relock: Act<RelockValuesInput>;
  draft: Act<SetValuesInput>;
  drop: Act<DropOverrideInput, { dropped: number }>;
}

type Asking =
  | { kind: 'unlock'; slots: readonly ShotSlot[] }
  | { kind: 'relock'; locks: readonly OutdatedLock[] }
  | { kind: 'override'; slot: ShotSlot }
  | { kind: 'drop'; slot: ShotSlot };

/** A download is noted after its bytes are sent; the page is read again a little later. */
const RECEIPT_WAIT_MS = 1500;

/** The acts on a shot: what is asked before, what is sent, and what came of it. `onDone` lets go of what was chosen. */
export function useShotActs(show: string, shot: ShotDetail, actions: ShotActions, onDone: () => void) {
  const router = useRouter();
  const [asking, setAsking] = useState<Asking | null>(null);
  const [opened, setOpened] = useState(0);
  const [report, setReport] = useState<LockShotsAnswer | null>(null);
  const locking = useAct(actions.lockShots);
  const lockingSome = useAct(actions.lockValues);
  const unlocking = useAct(actions.unlock);
  const relocking = useAct(actions.relock);
  const drafting = useAct(actions.draft);
  const dropping = useAct(actions.drop);
  const all = [locking, lockingSome, unlocking, relocking, drafting, dropping];

  function ask(next: Asking) {
    for (const one of all) one.forget();
    setReport(null);
    setAsking(next);
    setOpened((count) => count + 1);
  }

  function finish(said: string) {
    setAsking(null);
    setReport(null);
    onDone();
    toast(said);
  }

  return {
    asking,
    report,
    busy: all.some((one) => one.busy),
    refusal: all.find((one) => one.refusal !== null)?.refusal ?? null,
    /** Another opening of a dialog begins with empty fields. */
    dialogKey: (kind: Asking['kind']) => `${kind} ${opened}`,
    stopAsking: () => {
      setAsking(null);
      for (const one of all) one.forget();
    },
    closeReport: () => setReport(null),
    afterDownload: () => void setTimeout(() => router.refresh(), RECEIPT_WAIT_MS),
    lockShot: () => {
      setReport(null);
      void locking.act({ show, shots: [shot.code] }, (answer) => {
        onDone();
        setReport(answer);
      });
    },
    lock: (slots: readonly ShotSlot[]) => {
      const { lockable } = slotActs(slots);
      const missing = slots.filter((slot) => slot.lock === null && slot.ready_value_id === null).map(missingOf);
      const items = lockable.flatMap(({ asset, part, row, copy, ready_value_id: value }) => (value === null ? [] : [{ asset, ...(row === 'body' ? { body: part } : { part }), copy: copy ?? '', value_id: value }]));
      setReport(null);
      void lockingSome.act({ show, shot: shot.code, items }, () => {
        onDone();
        setReport({ locked: items.length, missing });
      });
    },
    askUnlock: (slots: readonly ShotSlot[]) => ask({ kind: 'unlock', slots: slotActs(slots).locked }),
    unlock: (reason: string) => {
      if (asking?.kind !== 'unlock') return;
      const locks = [...new Set(asking.slots.flatMap((slot) => slot.lock?.id ?? []))];
      void unlocking.act({ show, shot: shot.code, items: locks.map((lock) => ({ lock })), reason }, () => finish(`${counted(locks.length, 'part')} unlocked`));
    },
    askRelock: (slots: readonly ShotSlot[]) => ask({ kind: 'relock', locks: slotActs(slots).outdated }),
    relock: (items: { lock: string; value_id: string }[], reason: string) => void relocking.act({ show, items, reason }, () => finish(`${counted(items.length, 'part')} re-locked`)),
    askOverride: (slot: ShotSlot) => ask({ kind: 'override', slot }),
    draft: (item: SetValuesItem) => void drafting.act({ show, items: [item] }, () => finish('Override drafted; a lead approves it')),
    askDrop: (slot: ShotSlot) => ask({ kind: 'drop', slot }),
    drop: ({ asset, part }: ShotSlot, reason: string) => void dropping.act({ show, shot: shot.code, asset, part, reason }, () => finish('Override dropped')),
  };
}
