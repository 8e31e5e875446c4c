'use client';

import type { KeyboardEvent } from 'react';

export interface QueueActs {
  move: (steps: number, extend: boolean) => void;
  toggle: () => void;
  all: () => void;
  none: () => void;
  approve: () => void;
  /** Approves all without warnings in the asset of the active row. */
  approveAsset: () => void;
  note: () => void;
  takeBack: () => void;
  ask: () => void;
  carryOver: () => void;
  compare: () => void;
  open: () => void;
  keys: () => void;
}

const FAR = Number.MAX_SAFE_INTEGER;

/** The keys of the approvals queue. Answers true when the key was one of them, so that the browser leaves it alone. */
export function answerQueueKey(event: KeyboardEvent, acts: QueueActs, pageRows: number): boolean {
  const { key, shiftKey } = event;
  if (event.altKey) return false;
  if (event.ctrlKey || event.metaKey) return key === 'a' && !shiftKey ? answered(acts.all) : false;
  const moves: Record<string, number> = {
    ArrowDown: 1,
    j: 1,
    J: 1,
    ArrowUp: -1,
    k: -1,
    K: -1,
    PageDown: pageRows,
    PageUp: -pageRows,
    Home: -FAR,
    End: FAR,
  };
  if (key in moves) return answered(() => acts.move(moves[key], shiftKey));
  const plain: Record<string, () => void> = {
    x: acts.toggle,
    ' ': acts.toggle,
    Escape: acts.none,
    a: acts.approve,
    A: acts.approveAsset,
    n: acts.note,
    t: acts.takeBack,
    q: acts.ask,
    o: acts.carryOver,
    c: acts.compare,
    Enter: acts.open,
    '?': acts.keys,
  };
  return key in plain ? answered(plain[key]) : false;
}

function answered(act: () => void): true {
  act();
  return true;
}
