import type { ActRefusal } from '@/hooks/use-approval-acts';
import type { QueueRow } from '@/lib/rules/approval-queue';
import type { WordsWish } from './words-dialog';

const NOTE_LENGTH = 2000;
const REASON_LENGTH = 500;

type Send = (text: string) => Promise<ActRefusal>;

const named = (rows: readonly Pick<QueueRow, 'asset' | 'part'>[]) =>
  rows.length === 1 ? `${rows[0].asset} ${rows[0].part}` : `${rows.length.toLocaleString('en')} values`;

/** Approving with a note, which stands beside the approval from then on. */
export function noteWish(rows: readonly QueueRow[], send: Send): WordsWish {
  return {
    title: `Approve ${named(rows)}`,
    description: rows.length === 1 ? rows[0].verdict : undefined,
    label: 'Note',
    required: false,
    act: 'Approve',
    maxLength: NOTE_LENGTH,
    send,
  };
}

/** Taking an approval back; the shots where it is locked are named before the server refuses it. */
export function takeBackWish(rows: readonly QueueRow[], send: Send): WordsWish {
  const locked = [...new Set(rows.flatMap((row) => row.locked_shots))];
  return {
    title: `Take back the approval of ${named(rows)}`,
    description:
      locked.length === 0
        ? undefined
        : `Locked in ${locked.join(', ')}. Where it is locked to this approval it is unlocked first.`,
    label: 'Reason',
    required: true,
    act: 'Take back',
    maxLength: REASON_LENGTH,
    send,
  };
}

/** Asking the leads for an approval. */
export function questionWish(subject: string, send: Send): WordsWish {
  return {
    title: `Ask for the approval of ${subject}`,
    description: 'The leads see it first in their queue.',
    label: 'Note',
    required: false,
    act: 'Ask',
    maxLength: NOTE_LENGTH,
    send,
  };
}
