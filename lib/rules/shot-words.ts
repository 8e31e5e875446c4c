/** How far a shot is. What is missing comes before what is out of date: it has nothing at all. */
export const SHOT_STATES = ['missing', 'outdated', 'complete', 'empty'] as const;
export type ShotState = (typeof SHOT_STATES)[number];

export const SHOT_STATE_WORDS: Record<ShotState, string> = { missing: 'missing', outdated: 'out of date', complete: 'complete', empty: 'nothing in it' };

/** Counts of the parts in a shot, or of one asset in it. */
export interface Standing {
  /** Live locks. */
  locked: number;
  /** Parts without a lock; what is left out does not count. */
  missing: number;
  /** Live locks whose part has another value by now, or none. */
  outdated: number;
}

export function shotState({ locked, missing, outdated }: Standing): ShotState {
  if (missing > 0) return 'missing';
  if (outdated > 0) return 'outdated';
  return locked > 0 ? 'complete' : 'empty';
}

/** The verdict on a shot in a few words: `complete`, `2 missing`, `2 missing, 1 out of date`. */
export function shotVerdict(standing: Standing): string {
  const { missing, outdated } = standing;
  const words = [missing > 0 ? `${missing.toLocaleString('en')} missing` : '', outdated > 0 ? `${outdated.toLocaleString('en')} out of date` : ''].filter((word) => word !== '');
  return words.length > 0 ? words.join(', ') : SHOT_STATE_WORDS[shotState(standing)];
}

/** `1 part`, `12 parts`. */
export function counted(count: number, one: string, many = `${one}s`): string {
  return `${count.toLocaleString('en')} ${count === 1 ? one : many}`;
}

/** An asset in a shot, its copy named from the second on: `lantern`, `lantern 2`. */
export function assetInShot(asset: string, copy: string | null): string {
  return copy ? `${asset} ${copy}` : asset;
}
