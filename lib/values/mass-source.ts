import type { MassSource } from '@/lib/rules/states';
import type { MassSetting } from './value-inputs';

/** What the mass is computed from: one source, with the number that the engine takes. */
export interface AppliedSource {
  source: MassSource;
  targetMassKg: number | null;
  densityKgPerM3: number | null;
  arealDensityKgPerM2: number | null;
}

/** Why a mass that was given cannot be used yet. */
export interface MissingPiece {
  code: 'wall_missing' | 'density_missing' | 'areal_density_missing';
  message: string;
}

/**
 * The first source that fits the construction, in the order target mass, density, material, weight per area.
 * Solid and hollow parts take a density; a sheet takes a weight per area, or a density times its wall.
 * Null source: no mass yet; `missing` then says what a started setting lacks.
 */
export function massSource(setting: MassSetting): { applied: AppliedSource | null; missing: MissingPiece | null } {
  const { construction, material, wallM } = setting;
  const nothing = { targetMassKg: null, densityKgPerM3: null, arealDensityKgPerM2: null };
  if (construction === 'hollow' && wallM === null) {
    return { applied: null, missing: { code: 'wall_missing', message: 'A hollow part needs its wall thickness.' } };
  }
  if (setting.targetMassKg !== null) return { applied: { ...nothing, source: 'target_mass', targetMassKg: setting.targetMassKg }, missing: null };
  if (construction !== 'sheet') {
    const source = setting.densityKgPerM3 !== null ? 'density' : 'material';
    const densityKgPerM3 = setting.densityKgPerM3 ?? material?.densityKgPerM3 ?? null;
    if (densityKgPerM3 !== null) return { applied: { ...nothing, source, densityKgPerM3 }, missing: null };
    if (setting.arealDensityKgPerM2 === null && material === null) return { applied: null, missing: null };
    return { applied: null, missing: { code: 'density_missing', message: `A ${construction} part needs a density; weight per area is for sheets.` } };
  }
  const byWall = (density: number | null): number | null => (density === null || wallM === null ? null : density * wallM);
  const candidates: [MassSource, number | null][] = [
    ['density', byWall(setting.densityKgPerM3)],
    ['material', material?.arealDensityKgPerM2 ?? byWall(material?.densityKgPerM3 ?? null)],
    ['areal_density', setting.arealDensityKgPerM2],
  ];
  for (const [source, arealDensityKgPerM2] of candidates) {
    if (arealDensityKgPerM2 !== null) return { applied: { ...nothing, source, arealDensityKgPerM2 }, missing: null };
  }
  if (setting.densityKgPerM3 === null && material === null) return { applied: null, missing: null };
  return { applied: null, missing: { code: 'areal_density_missing', message: 'A sheet needs a weight per area, or a wall thickness beside its density.' } };
}
