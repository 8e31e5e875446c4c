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
