import { sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import type { Construction } from '@/lib/rules/states';
import type { MassSetting } from '@/lib/values/value-inputs';

interface SettingRow extends Record<string, unknown> {
  part_id: string;
  shot_id: string;
  construction: Construction;
  target_mass_kg: number | null;
  density_kg_m3: number | null;
  areal_density_kg_m2: number | null;
  wall_m: number | null;
  variant: string | null;
  material_id: string | null;
  material_name: string;
  material_revision: number;
  material_density: number | null;
  material_areal_density: number | null;
}

/** The settings of the overrides that stand, by `part shot` (ids); the material as it is now. */
export async function loadOverrideSettings(db: Executor, which: readonly { partId: string; shotId: string }[]): Promise<Map<string, MassSetting>> {
  const { rows } = await db.execute<SettingRow>(sql`
    select o.part_id, o.shot_id, s.construction, s.target_mass_kg, s.density_kg_m3, s.areal_density_kg_m2, s.wall_m, s.variant,
      m.id as material_id, m.name as material_name, m.revision as material_revision, m.density_kg_m3 as material_density, m.areal_density_kg_m2 as material_areal_density
    from unnest(${sql.param(which.map((one) => one.partId))}::uuid[], ${sql.param(which.map((one) => one.shotId))}::uuid[]) as given(part_id, shot_id)
    join shot_overrides o on o.part_id = given.part_id and o.shot_id = given.shot_id and o.dropped_at is null
    join settings s on s.id = o.setting_id
    left join materials m on m.id = s.material_id`);
  return new Map(
    rows.map((row) => [
      `${row.part_id} ${row.shot_id}`,
      {
        construction: row.construction,
        targetMassKg: row.target_mass_kg,
        densityKgPerM3: row.density_kg_m3,
        material: row.material_id === null ? null : { id: row.material_id, name: row.material_name, revision: row.material_revision, densityKgPerM3: row.material_density, arealDensityKgPerM2: row.material_areal_density },
        arealDensityKgPerM2: row.areal_density_kg_m2,
        wallM: row.wall_m,
        variant: row.variant,
        leftOut: false,
      },
    ]),
  );
}
