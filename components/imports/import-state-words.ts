import type { ImportAnswer } from '@/lib/rules/import-answer';
import type { ImportState } from '@/lib/rules/states';

const WORDS: Record<ImportState, string> = {
  open: 'not submitted',
  queued: 'waiting',
  running: 'being measured',
  done: 'done',
  cancelled: 'cancelled',
};

/** An import's state in a word; one that is paused says so. */
export function importStateWords({ state, paused }: Pick<ImportAnswer, 'state' | 'paused'>): string {
  return paused && (state === 'queued' || state === 'running') ? 'paused' : WORDS[state];
}
