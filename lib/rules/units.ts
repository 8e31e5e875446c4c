export const LINEAR_UNITS = ['mm', 'cm', 'dm', 'm', 'in', 'ft'] as const;
export type LinearUnit = (typeof LINEAR_UNITS)[number];

/** Metres in one linear unit. Inch and foot are exact by the international agreement of 1959. */
export const METRES_PER: Record<LinearUnit, number> = {
  mm: 0.001,
  cm: 0.01,
  dm: 0.1,
  m: 1,
  in: 0.0254,
  ft: 0.3048,
};

export const UP_AXES = ['y', 'z'] as const;
export type UpAxis = (typeof UP_AXES)[number];

/** What becomes of a file that states another unit or up axis than the show's. */
export const OTHER_SPACE_WORDS = ['convert', 'refuse'] as const;
export type OtherSpace = (typeof OTHER_SPACE_WORDS)[number];

/** How a file's axes are turned into the show's: not at all, or by a quarter turn about x. */
export const TURN_WORDS = ['none', 'y-to-z', 'z-to-y'] as const;
export type Turn = (typeof TURN_WORDS)[number];
