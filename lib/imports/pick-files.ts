import type { Lane } from '@/lib/rules/fair-turns';

/** What one turn may take at most: enough that asking for the next one costs nothing beside it, little enough that work is shared and a turn is soon over. */
export const TURN_FILES = 40;
export const TURN_BYTES = 4 * 1024 * 1024;
export const TURN_FACES = 120_000;

/** A file that has not ended. */
export interface Candidate {
  id: string;
  importId: string;
  /** Code of the asset that it goes to; null for a name that matches nothing. */
  asset: string | null;
  byteSize: number;
  /** The most faces that it can have. */
  faces: number;
  /** Bytes of memory that measuring it takes; Infinity for one that this process leaves to a roomier one. */
  memory: number;
  /** In a worker's hand, or put off after a fault. */
  isOut: boolean;
}

/** A file that fills a turn by itself. */
export const laneOf = ({ byteSize, faces }: Pick<Candidate, 'byteSize' | 'faces'>): Exclude<Lane, 'all'> => (byteSize > TURN_BYTES || faces > TURN_FACES ? 'large' : 'small');

/** Work that a file stands for, in bytes: its own, and what a file costs however small it is. */
export const workOf = ({ byteSize }: Pick<Candidate, 'byteSize'>): number => byteSize + 32 * 1024;

/**
 * The next files of one lane, in the order given, as many as a turn takes. A file waits for every earlier one of its asset that is not in the same turn, so
 * that takes and unnumbered versions come out the same every time. `tooLarge` is the first one that was left for want of room.
 */
export function pickFiles(candidates: readonly Candidate[], lane: Exclude<Lane, 'all'>, roomFor: (id: string) => number): { picked: Candidate[]; tooLarge: Candidate | null } {
  const picked: Candidate[] = [];
  const waitsBehind = new Set<string>();
  let tooLarge: Candidate | null = null;
  let bytes = 0;
  let faces = 0;
  for (const file of candidates) {
    if (file.asset !== null && waitsBehind.has(file.asset)) continue;
    const isRight = !file.isOut && laneOf(file) === lane;
    if (isRight && file.memory <= roomFor(file.id)) {
      picked.push(file);
      bytes += file.byteSize;
      faces += file.faces;
      if (lane === 'large' || picked.length >= TURN_FILES || bytes >= TURN_BYTES || faces >= TURN_FACES) break;
      continue;
    }
    if (isRight && file.memory < Infinity) tooLarge ??= file;
    if (file.asset !== null) waitsBehind.add(file.asset);
  }
  return { picked, tooLarge };
}
