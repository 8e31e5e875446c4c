import type { MassEntry } from './parse-mass-entry';
import type { PartRow } from './part-row';
import type { Construction } from './states';

/** What one item of PATCH …/parts changes; null clears, absent leaves. SI. */
export interface ValueChange {
  construction?: Construction;
  target_mass_kg?: number | null;
  density_kg_m3?: number | null;
  material?: string | null;
  areal_density_kg_m2?: number | null;
  wall_m?: number | null;
  left_out?: boolean;
}

/** A change of one row as the API takes it. */
export interface ValueItem extends ValueChange {
  asset: string;
  part?: string;
  body?: string;
  revision: number;
}

/** Names the row in a call, with the revision that was seen. */
export function itemFor(row: PartRow, change: ValueChange): ValueItem {
  const named = row.row === 'body' ? { body: row.body ?? '' } : { part: row.part ?? '' };
  return { asset: row.asset, ...named, revision: row.revision, ...change };
}

/** Sets one source and clears those that would win over it: target mass wins over density, density over material, material over weight per area. */
export function changeOf(entry: MassEntry): ValueChange {
  switch (entry.kind) {
    case 'target_mass':
      return { target_mass_kg: entry.massKg };
    case 'density':
      return { target_mass_kg: null, density_kg_m3: entry.densityKgPerM3 };
    case 'material':
      return { target_mass_kg: null, density_kg_m3: null, material: entry.name };
    case 'areal_density':
      return {
        target_mass_kg: null,
        density_kg_m3: null,
        material: null,
        areal_density_kg_m2: entry.arealDensityKgPerM2,
      };
  }
}

/**
 * The change that brings back what `before` says. The row's density is the one that follows, so it is brought back only
 * where it was what the mass came from.
 */
export function restoring(before: PartRow): ValueChange {
  return {
    construction: before.construction,
    target_mass_kg: before.target_mass_kg,
    density_kg_m3: before.mass_source === 'density' ? before.density_kg_m3 : null,
    material: before.material,
    areal_density_kg_m2: before.mass_source === 'areal_density' ? before.areal_density_kg_m2 : null,
    wall_m: before.wall_m,
    left_out: before.state === 'left_out',
  };
}

/**
 * Shares a mass over parts by their volumes, as one density over all of them does; null where a part has no volume.
 * Order is kept; masses in kg.
 */
export function shareByVolume(rows: readonly PartRow[], massKg: number): number[] | null {
  const volumes = rows.map((row) => row.volume_m3 ?? 0);
  if (volumes.some((volume) => !(volume > 0))) return null;
  const whole = volumes.reduce((sum, volume) => sum + volume, 0);
  return volumes.map((volume) => (massKg * volume) / whole);
}
