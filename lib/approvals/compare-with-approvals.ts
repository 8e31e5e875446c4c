import { sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { compareValues, type ValueComparison } from '@/lib/engine/inertia/compare-values';
import { toComparedValue, type ValueNumbers } from './to-compared-value';

const NUMBERS = ['mass_kg', 'com_x_m', 'com_y_m', 'com_z_m', 'ixx_kg_m2', 'iyy_kg_m2', 'izz_kg_m2', 'ixy_kg_m2', 'ixz_kg_m2', 'iyz_kg_m2', 'i1_kg_m2', 'i2_kg_m2', 'i3_kg_m2', 'axes_quat_w', 'axes_quat_x', 'axes_quat_y', 'axes_quat_z', 'free_axes', 'bounds_m'];

/** The numbers that are compared, of a table or alias with a value's columns, as one JSON object. */
export function numbersOf(table: string) {
  return sql.raw(`json_build_object(${NUMBERS.map((name) => `'${name}', ${table}.${name}`).join(', ')})`);
}

/** Each part's value against its newest standing approval; parts without a value or an approval are absent. */
export async function compareWithApprovals(db: Executor, partIds: readonly string[]): Promise<Map<string, ValueComparison>> {
  if (partIds.length === 0) return new Map();
  const { rows } = await db.execute<{ part_id: string; before: ValueNumbers; after: ValueNumbers }>(sql`
    select c.part_id, ${numbersOf('a')} as before, ${numbersOf('c')} as after
    from part_current c join approvals a on a.id = c.last_approval_id
    where c.part_id = any(${sql.param(partIds)}::uuid[]) and c.mass_kg is not null`);
  return new Map(rows.map((row) => [row.part_id, compareNumbers(row.before, row.after)]));
}

export function compareNumbers(before: ValueNumbers, after: ValueNumbers): ValueComparison {
  return compareValues(toComparedValue(before), toComparedValue(after), sizeOf(before.bounds_m));
}

/** Diagonal of a box given by its least and greatest x, y, z. */
function sizeOf(bounds: readonly number[] | null): number {
  return bounds ? Math.hypot(bounds[3] - bounds[0], bounds[4] - bounds[1], bounds[5] - bounds[2]) : 0;
}
