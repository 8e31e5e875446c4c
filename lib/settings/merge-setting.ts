import type { SetValuesItem } from '@/lib/rules/inputs/set-values';
import type { MassSetting, MaterialNow } from '@/lib/values/value-inputs';

/**
 * The setting after an item: what it leaves out stays, null clears. A mass source that is given (target mass, density, material,
 * weight per area) replaces the others, since one part has one mass; of several given in one item the order of mass sources decides.
 */
export function mergeSetting(before: MassSetting, item: SetValuesItem, material: MaterialNow | null | undefined): MassSetting {
  const sources = [item.target_mass_kg, item.density_kg_m3, material, item.areal_density_kg_m2];
  const replaces = sources.some((source) => source !== null && source !== undefined);
  const next = <T>(given: T | null | undefined, kept: T | null): T | null => (given === undefined ? (replaces ? null : kept) : given);
  return {
    construction: item.construction ?? before.construction,
    targetMassKg: next(item.target_mass_kg, before.targetMassKg),
    densityKgPerM3: next(item.density_kg_m3, before.densityKgPerM3),
    material: next(material, before.material),
    arealDensityKgPerM2: next(item.areal_density_kg_m2, before.arealDensityKgPerM2),
    wallM: item.wall_m === undefined ? before.wallM : item.wall_m,
    variant: item.variant === undefined ? before.variant : item.variant || null,
    leftOut: item.left_out ?? before.leftOut,
  };
}

export interface SettingChange {
  /** As the API names it. */
  field: string;
  before: string | null;
  after: string | null;
}

/** What differs between two settings, as the history tells it; empty where they are equal. */
export function settingChanges(before: MassSetting, after: MassSetting): SettingChange[] {
  const texts = (setting: MassSetting): Record<string, string | null> => ({
    construction: setting.construction,
    target_mass_kg: numberText(setting.targetMassKg),
    density_kg_m3: numberText(setting.densityKgPerM3),
    material: setting.material?.name ?? null,
    areal_density_kg_m2: numberText(setting.arealDensityKgPerM2),
    wall_m: numberText(setting.wallM),
    variant: setting.variant,
    left_out: String(setting.leftOut),
  });
  const old = texts(before);
  const fresh = texts(after);
  const sameMaterial = before.material?.id === after.material?.id;
  return Object.keys(fresh)
    .filter((field) => old[field] !== fresh[field] || (field === 'material' && !sameMaterial))
    .map((field) => ({ field, before: old[field], after: fresh[field] }));
}

function numberText(value: number | null): string | null {
  return value === null ? null : String(value);
}
