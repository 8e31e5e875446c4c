import rows from './materials.json' with { type: 'json' };

/** A material of the studio's library: a density or, for sheet goods, a weight per area, with its working range. */
export interface StudioMaterial {
  name: string;
  category: string;
  densityKgPerM3: number | null;
  arealDensityKgPerM2: number | null;
  /** Working range in the same unit; null where none is known. */
  low: number | null;
  high: number | null;
  /** The published table the number belongs to, and where it was read. */
  source: string;
  /** True where the number was written down from memory and not seen in a table. */
  fromMemory: boolean;
}

/** The library that a new studio starts with. Woods are at 12 % moisture: 1000 · G · 1.12 kg/m³ (USDA Wood Handbook). */
export const STUDIO_MATERIALS: readonly StudioMaterial[] = rows;
