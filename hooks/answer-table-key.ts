'use client';

import type { KeyboardEvent } from 'react';

export interface TableActs {
  move: (steps: number, extend: boolean) => void;
  toggle: () => void;
  all: () => void;
  none: () => void;
  /** Starts typing a mass with this text. */
  type: (start: string) => void;
  form: () => void;
  /** Asks for the approval of what is chosen. */
  ask: () => void;
  open: () => void;
  /** Opens (true) or closes the asset of the active row. */
  unfold: (open: boolean) => void;
  undo: () => void;
  find: () => void;
  inspect: () => void;
  keys: () => void;
}

const FAR = Number.MAX_SAFE_INTEGER;

/** The keys of the parts table. Answers true when the key was one of them, so that the browser leaves it alone. */
export function answerTableKey(event: KeyboardEvent, acts: TableActs, pageRows: number): boolean {
  const { key, shiftKey } = event;
  if (event.ctrlKey || event.metaKey) return answerWithControl(event, acts);
  if (event.altKey) return false;
  const moves: Record<string, number> = {
    ArrowDown: 1,
    ArrowUp: -1,
    PageDown: pageRows,
    PageUp: -pageRows,
    Home: -FAR,
    End: FAR,
  };
  if (key in moves) return answered(() => acts.move(moves[key], shiftKey));
  const plain: Record<string, () => void> = {
    ' ': acts.toggle,
    Escape: acts.none,
    Enter: acts.open,
    F2: () => acts.type(''),
    m: acts.form,
    M: acts.form,
    a: acts.ask,
    A: acts.ask,
    i: acts.inspect,
    I: acts.inspect,
    '/': acts.find,
    '?': acts.keys,
    ArrowLeft: () => acts.unfold(false),
    ArrowRight: () => acts.unfold(true),
  };
  if (key in plain) return answered(plain[key]);
  return /^[0-9.]$/.test(key) ? answered(() => acts.type(key)) : false;
}

function answerWithControl(event: KeyboardEvent, acts: TableActs): boolean {
  if (event.shiftKey) return false;
  const held: Record<string, () => void> = { a: acts.all, z: acts.undo };
  return event.key in held ? answered(held[event.key]) : false;
}

function answered(act: () => void): true {
  act();
  return true;
}
