/** What a person made of a proposal: one part under another name, or two parts. */
export const RENAME_DECISIONS = ['confirmed', 'refused'] as const;
export type RenameDecision = (typeof RENAME_DECISIONS)[number];

/** How two parts fit: the same geometry in the same place, the same geometry elsewhere, or not by geometry but by hand. */
export const RENAME_FITS = ['place', 'shape', 'hand'] as const;
export type RenameFit = (typeof RENAME_FITS)[number];

/** What hangs on a part that the current version lacks. */
export interface AbsentPart {
  part: string;
  /** Newest version that has it. */
  last_version: string;
  has_setting: boolean;
  approvals: number;
  /** Live locks. */
  locks: number;
}

/** A part that came with the current version, or since the last version that the absent ones were in. */
export interface ArrivedPart {
  part: string;
  first_version: string;
  has_setting: boolean;
  approvals: number;
  locks: number;
  /** Shots with an override of it that stands. */
  overrides: number;
}

export interface RenameProposal {
  part: string;
  becomes: string;
  fit: Exclude<RenameFit, 'hand'>;
  /** Other arrived parts that have the same geometry. */
  others: number;
}

/** One asset whose current version lacks parts and brought new ones. `absent` and `arrived` are what can be told to be the same by hand. */
export interface AssetRenames {
  asset: string;
  version: string;
  proposals: RenameProposal[];
  /** Pairs that a person kept apart. */
  kept_apart: { part: string; becomes: string }[];
  absent: AbsentPart[];
  arrived: ArrivedPart[];
}

/** Why an arrived part cannot take up another one's identity; null where it can. */
export function whyNotRenamed({ approvals, locks, overrides }: Pick<ArrivedPart, 'approvals' | 'locks' | 'overrides'>): string | null {
  if (locks > 0) return `It is locked in ${locks === 1 ? 'a shot' : `${locks} shots`}. Unlock it first.`;
  if (approvals > 0) return 'It is approved. Take its approval back first.';
  return overrides > 0 ? `It has an override in ${overrides === 1 ? 'a shot' : `${overrides} shots`}. Drop it first.` : null;
}
