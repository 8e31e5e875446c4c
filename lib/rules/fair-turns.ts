/** What is given work in turn: a show as a whole, and within it its small and its large files. */
export const LANES = ['all', 'small', 'large'] as const;
export type Lane = (typeof LANES)[number];

/** The last turn of somebody on a clock that counts work: where it began and ended. */
export interface Turn {
  began: number;
  ended: number;
}

/**
 * Where the next turn of each begins, least first: at the end of its last one, or now for whoever had none lately, so that a newcomer is next and nobody
 * saves up turns by staying away. Equal ones keep their order.
 */
export function inTurn<Name>(names: readonly Name[], turnOf: (name: Name) => Turn | undefined, now: number): { name: Name; begins: number }[] {
  return names.map((name) => ({ name, begins: Math.max(now, turnOf(name)?.ended ?? now) })).toSorted((a, b) => a.begins - b.begins);
}

/** The clock's now: where the latest turn began. Nobody who waits is behind it. */
export const nowOf = (turns: readonly Turn[]): number => turns.reduce((latest, turn) => Math.max(latest, turn.began), 0);
