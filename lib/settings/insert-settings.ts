import { sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import type { Origin } from '@/lib/rules/states';
import type { LoadedPart } from '@/lib/values/load-value-inputs';

/** Appends one setting a part, or an override's in a shot with its reason, and answers their ids by part. */
export async function insertSettings(tx: Transaction, parts: readonly (Pick<LoadedPart, 'partId' | 'setting'> & { shotId?: string; reason?: string })[], by: { setBy: string; setFrom: Origin }): Promise<Map<string, number>> {
  const rows = parts.map(({ partId, setting, shotId, reason }) => ({
    part_id: partId,
    shot_id: shotId ?? null,
    reason: reason ?? null,
    construction: setting.construction,
    target_mass_kg: setting.targetMassKg,
    density_kg_m3: setting.densityKgPerM3,
    material_id: setting.material?.id ?? null,
    material_revision: setting.material?.revision ?? null,
    areal_density_kg_m2: setting.arealDensityKgPerM2,
    wall_m: setting.wallM,
    variant: setting.variant,
    left_out: setting.leftOut,
  }));
  const { rows: inserted } = await tx.execute<{ id: string; part_id: string }>(sql`
    insert into settings (part_id, shot_id, reason, construction, target_mass_kg, density_kg_m3, material_id, material_revision, areal_density_kg_m2, wall_m, variant, left_out, set_by, set_from)
    select part_id, shot_id, reason, construction, target_mass_kg, density_kg_m3, material_id, material_revision, areal_density_kg_m2, wall_m, variant, left_out, ${by.setBy}::uuid, ${by.setFrom}
    from json_to_recordset(${JSON.stringify(rows)}::json) as given(part_id uuid, shot_id uuid, reason text, construction text, target_mass_kg float8, density_kg_m3 float8, material_id uuid,
      material_revision integer, areal_density_kg_m2 float8, wall_m float8, variant text, left_out boolean)
    returning id, part_id`);
  return new Map(inserted.map((row) => [row.part_id, Number(row.id)]));
}
