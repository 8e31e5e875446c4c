/** What a person made of a proposal: one part under another name, or two parts. */
export const RENAME_DECISIONS = ['confirmed', 'refused'] as const;
export type RenameDecision = (typeof RENAME_DECISIONS)[number];

/** How two parts fit: the same geometry in the same place, the same geometry elsewhere, or not by geometry but by hand. */
export const RENAME_FITS = ['place', 'shape', 'hand'] as const;
export type RenameFit = (typeof RENAME_FITS)[number];
