/** Different vertices in almost one place, which a weld would join. */
export const NEAR_COINCIDENT_VERTICES = 'near_coincident_vertices';
