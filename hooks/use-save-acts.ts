'use client';

import { useState } from 'react';
import { toast } from 'sonner';
import type { Conflict, Outcome, RowChange, useSetValues } from './use-set-values';

const count = (rows: number) => (rows === 1 ? 'one part' : `${rows.toLocaleString('en')} parts`);

/** Saves and says what came of it: done with a way back, refused with a way to try again, or changed by somebody else. */
export function useSaveActs({
  send,
  undo,
  takeTheirs,
}: Pick<ReturnType<typeof useSetValues>, 'send' | 'undo' | 'takeTheirs'>) {
  const [conflict, setConflict] = useState<Conflict | null>(null);

  function tell(outcome: Outcome, saved: string, again: () => void): void {
    if (outcome.kind === 'saved') {
      const { act } = outcome;
      toast(saved, act === null ? undefined : { action: { label: 'Undo', onClick: () => void takeBack(act) } });
    } else if (outcome.kind === 'conflict') setConflict(outcome.conflict);
    else if (outcome.kind === 'refused') {
      toast.error(outcome.message, { action: { label: 'Try again', onClick: again }, duration: 20_000 });
    }
  }

  async function set(changes: readonly RowChange[]): Promise<void> {
    setConflict(null);
    tell(await send(changes), `Set on ${count(changes.length)}`, () => void set(changes));
  }

  async function takeBack(act?: number): Promise<void> {
    const outcome = await undo(act);
    if (outcome.kind === 'nothing') toast('Nothing to take back');
    else tell(outcome, `Taken back on ${count(outcome.kind === 'saved' ? outcome.rows : 0)}`, () => void takeBack(act));
  }

  function keepTheirs(of: Conflict): void {
    takeTheirs(of.moved.map(({ current }) => current));
    setConflict(null);
  }

  return { set, takeBack, conflict, keepTheirs, leaveConflict: () => setConflict(null) };
}
